/** Pages on real threads of Node: none twice, none lost, and a failure is told, never waited on. */
import { describe, expect, it } from "vitest";
import { ThreadPool } from "@/lib/server/threads/pool";

const start = new URL("./fixtures/counting-thread.mjs", import.meta.url);
let handedOut: string[] = [];

async function* pages(...firsts: string[]): AsyncGenerator<readonly string[]> {
  handedOut = [];
  for (const first of firsts) {
    await Promise.resolve();
    handedOut.push(first);
    yield [first, "b", "c"];
  }
}

async function work(...firsts: string[]): Promise<number> {
  const pool = await ThreadPool.start({ start, threads: 2, workerData: null });
  try {
    return await pool.work(pages(...firsts));
  } finally {
    await pool.end();
  }
}

describe("a pool of threads", () => {
  it("answers for every page once", async () => {
    const many = Array.from({ length: 41 }, (_, n) => `page ${n}`);
    expect(await work(...many)).toBe(41 * 3);
    expect(handedOut).toEqual(many);
    expect(await work()).toBe(0);
  });

  it.each([
    ["fail", "no room on the disk"],
    ["die", "exit code 3"],
    ["throw", "thrown out of turn"],
  ])("tells of a thread that comes to %s and hands out no more pages", async (how, message) => {
    const after = Array.from({ length: 50 }, (_, n) => `later ${n}`);
    await expect(work("first", how, ...after)).rejects.toThrow(message);
    expect(handedOut.length).toBeLessThan(50);
  });

  it("tells of a thread that cannot start", async () => {
    const order = { start, threads: 2, workerData: "never starts" };
    await expect(ThreadPool.start(order)).rejects.toThrow("no such database");
  });
});
