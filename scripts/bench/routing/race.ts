/**
 * Two searches of one instance on two cores, in worker threads that hand each other their elites.
 * The core knows nothing of it: it exports its best plan and takes over a better one.
 */
import { MessageChannel, Worker } from "node:worker_threads";
import type { Routes } from "../../../lib/routing/problem";
import type { Listed } from "./folder";

/** What one thread is asked to do. */
export interface Task {
  readonly instance: Listed;
  readonly seed: number;
  readonly seconds: number;
  /** Count processor time of the whole process, `threads` times `seconds`, in place of wall time. */
  readonly cpu: boolean;
  readonly threads: number;
}

export interface Finish {
  readonly routes: Routes;
  /** Must sites missed count as a million million each. */
  readonly rank: number;
  readonly iterations: number;
}

export class Race {
  private readonly workers: Worker[];

  constructor(private readonly threads: number) {
    const file = new URL("./thread-start.mjs", import.meta.url);
    this.workers = Array.from({ length: threads }, () => new Worker(file));
    const channels = this.workers.map(() => new MessageChannel());
    this.workers.forEach((worker, i) => {
      const next = channels[(i + 1) % threads]!;
      const ports = { receive: channels[i]!.port2, send: next.port1 };
      worker.postMessage(ports, [ports.receive, ports.send]);
    });
  }

  /** Runs the task on every thread and returns the best end, with the iterations of all. */
  async run(task: Omit<Task, "threads">): Promise<Finish> {
    const ends = await Promise.all(
      this.workers.map(
        (worker, i) =>
          new Promise<Finish>((resolve, reject) => {
            worker.once("message", resolve);
            worker.once("error", reject);
            worker.postMessage({ ...task, seed: task.seed * 100 + i, threads: this.threads });
          }),
      ),
    );
    const best = ends.reduce((a, b) => (b.rank < a.rank ? b : a));
    return { ...best, iterations: ends.reduce((sum, end) => sum + end.iterations, 0) };
  }

  async close(): Promise<void> {
    await Promise.all(this.workers.map((worker) => worker.terminate()));
  }
}
