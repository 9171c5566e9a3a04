/**
 * Searches of one problem on several cores, in worker threads that hand each other their best
 * plans, in a ring. The core knows nothing of it: it exports its best plan and takes over a better
 * one. Counted in turns the threads wait for each other at every exchange, so that the same
 * problem, seed and turns give the same plan; counted in seconds they do not.
 */
import { MessageChannel, type MessagePort, Worker } from "node:worker_threads";
import type { Problem, Routes } from "../../routing/problem";
import type { Options } from "../../routing/solve";

/** How long each thread searches. */
export type Limit =
  | { readonly kind: "turns"; readonly turns: number }
  | { readonly kind: "seconds"; readonly seconds: number }
  /** Processor time of the whole process, so many seconds a thread: for a machine that is busy. */
  | { readonly kind: "processor"; readonly seconds: number };

export interface Task {
  readonly problem: Problem;
  readonly options: Options;
  readonly seed: number;
  readonly limit: Limit;
}

/** What a thread is given once: its ring, and how many exchanges each thread has sent so far. */
export interface Place {
  readonly index: number;
  readonly threads: number;
  readonly receive: MessagePort;
  readonly send: MessagePort;
  readonly sent: Int32Array;
  /** One number: 1 tells every thread to stop with the best it has. */
  readonly enough: Int32Array;
}

/** What a thread is asked to do. `run` tells elites of this task from those of the one before. */
export interface Order extends Task {
  readonly run: number;
}

export interface News {
  readonly kind: "news";
  readonly share: number;
  readonly rank: number;
}

export interface Finish {
  readonly kind: "finish";
  readonly routes: Routes;
  /** Cost in the problem's units; a must site missed counts a million million. */
  readonly rank: number;
  readonly iterations: number;
  /** Wall time of the search. */
  readonly seconds: number;
}

export class Race {
  private readonly workers: Worker[];
  private readonly sent: Int32Array;
  private readonly enough = new Int32Array(new SharedArrayBuffer(4));
  private runs = 0;

  constructor(private readonly threads: number) {
    this.sent = new Int32Array(new SharedArrayBuffer(4 * threads));
    const file = new URL("./thread-start.mjs", import.meta.url);
    this.workers = Array.from({ length: threads }, () => new Worker(file));
    const channels = this.workers.map(() => new MessageChannel());
    this.workers.forEach((worker, index) => {
      const send = channels[(index + 1) % threads]!.port1;
      const receive = channels[index]!.port2;
      const { sent, enough } = this;
      const place: Place = { index, threads, receive, send, sent, enough };
      worker.postMessage(place, [receive, send]);
    });
  }

  /**
   * Runs the task on every thread and returns the best end, with the iterations of all.
   * @param onNews how far the first thread is, and its best cost, some dozen times a run
   * @throws what a thread threw; the race is over then
   */
  async run(task: Task, onNews: (news: News) => void = () => {}): Promise<Finish> {
    this.sent.fill(0);
    this.enough.fill(0);
    this.runs += 1;
    const order: Order = { ...task, run: this.runs };
    const ends = await Promise.all(
      this.workers.map((worker, index) => {
        const own = index === 0 ? onNews : () => {};
        return ask(worker, { ...order, seed: task.seed * 100 + index }, own);
      }),
    );
    const best = ends.reduce((a, b) => (b.rank < a.rank ? b : a));
    return { ...best, iterations: ends.reduce((sum, end) => sum + end.iterations, 0) };
  }

  /** Lets the run end soon, with the best plan found by then. */
  stop(): void {
    Atomics.store(this.enough, 0, 1);
  }

  /** Ends the threads, whatever they are at. */
  async close(): Promise<void> {
    await Promise.all(this.workers.map((worker) => worker.terminate()));
  }
}

function ask(worker: Worker, order: Order, onNews: (news: News) => void): Promise<Finish> {
  return new Promise((resolve, reject) => {
    const done = () => {
      worker.off("message", hear);
      worker.off("error", fail);
      worker.off("exit", leave);
    };
    const hear = (message: News | Finish) => {
      if (message.kind === "news") return onNews(message);
      done();
      resolve(message);
    };
    const fail = (error: unknown) => {
      done();
      reject(error instanceof Error ? error : new Error(String(error)));
    };
    const leave = () => fail(new Error("The search was ended before it was over."));
    worker.on("message", hear);
    worker.on("error", fail);
    worker.on("exit", leave);
    worker.postMessage(order);
  });
}
