import { parentPort } from "node:worker_threads";

export type PageAnswer = { readonly count: number } | { readonly failed: string };

/** The thread's side of a pool: says that it is ready, then answers each page with its count. */
export function answerPages(work: (ids: readonly string[]) => Promise<number>): void {
  const answer = (word: PageAnswer): void => parentPort?.postMessage(word);
  parentPort?.on("message", (ids: readonly string[]) => {
    work(ids).then(
      (count) => answer({ count }),
      (error: unknown) =>
        answer({ failed: error instanceof Error ? error.message : String(error) }),
    );
  });
  answer({ count: 0 });
}
