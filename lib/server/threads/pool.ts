/**
 * A few threads that work through pages of ids. A page is handed out once; when one fails no
 * further ones are, those in hand are finished, and the failure is told.
 */
import { Worker } from "node:worker_threads";
import type { PageAnswer } from "./answer-pages";

export interface PoolOrder {
  /** Module that a thread runs; it answers pages with `answerPages`. */
  readonly start: URL;
  readonly threads: number;
  readonly workerData: unknown;
}

export class ThreadPool {
  private constructor(private readonly workers: readonly Worker[]) {}

  /** Starts the threads and waits until each is ready. @throws Error when one cannot start */
  static async start({ start, threads, workerData }: PoolOrder): Promise<ThreadPool> {
    const workers = Array.from({ length: threads }, () => new Worker(start, { workerData }));
    const pool = new ThreadPool(workers);
    try {
      await Promise.all(workers.map((worker) => answerOf(worker)));
    } catch (error) {
      await pool.end();
      throw error;
    }
    return pool;
  }

  /**
   * Works through all pages.
   * @returns the sum of the counts that the threads answered with
   * @throws Error of the first page that failed, once the pages in hand are finished
   */
  async work(pages: AsyncGenerator<readonly string[]>): Promise<number> {
    const failed: unknown[] = [];
    const counts = await Promise.all(
      this.workers.map(async (worker) => {
        let count = 0;
        try {
          for (;;) {
            const page = await pages.next();
            if (page.done === true || failed.length > 0) return count;
            worker.postMessage(page.value);
            count += await answerOf(worker);
          }
        } catch (error) {
          failed.push(error);
          return count;
        }
      }),
    );
    if (failed.length > 0) throw failed[0];
    return counts.reduce((sum, count) => sum + count, 0);
  }

  async end(): Promise<void> {
    await Promise.all(this.workers.map((worker) => worker.terminate()));
  }
}

/** A thread's next word; also one that dies without a word is heard. */
function answerOf(worker: Worker): Promise<number> {
  return new Promise((resolve, reject) => {
    const settle = (finish: () => void) => {
      worker.off("message", said).off("error", broke).off("exit", left);
      finish();
    };
    const said = (answer: PageAnswer) =>
      settle(() => ("count" in answer ? resolve(answer.count) : reject(new Error(answer.failed))));
    const broke = (error: Error) => settle(() => reject(error));
    const left = (code: number) =>
      settle(() => reject(new Error(`A thread ended by itself with exit code ${code}.`)));
    worker.once("message", said).once("error", broke).once("exit", left);
  });
}
