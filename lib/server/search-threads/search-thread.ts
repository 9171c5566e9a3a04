/** One thread of a race: see race.ts. */
import { parentPort, receiveMessageOnPort } from "node:worker_threads";
import type { Routes } from "../../routing/problem";
import { seededRng } from "../../routing/rng";
import { afterIterations, solve, type OnProgress, type Stop } from "../../routing/solve";
import type { Finish, Limit, News, Order, Place } from "./race";

/** Share of the run between two exchanges, and before the first. */
const EXCHANGE_EVERY = 0.05;
const EXCHANGE_FROM = 0.3;
const NEWS_EVERY = 1 / 12;
const MISSED_RANK = 1e12;

interface Elite {
  readonly run: number;
  readonly routes: Routes;
  readonly rank: number;
}

function stopAt(limit: Limit, threads: number): Stop {
  if (limit.kind === "turns") return afterIterations(limit.turns);
  if (limit.kind === "seconds") {
    const from = performance.now();
    return () => (performance.now() - from) / 1000 / limit.seconds;
  }
  const used = () => {
    const { user, system } = process.cpuUsage();
    return (user + system) / 1e6;
  };
  const from = used();
  return () => (used() - from) / (limit.seconds * threads);
}

/** The latest plan of the thread before this one in the ring, of this run; taken off the port. */
function latest({ receive }: Place, run: number): Elite | undefined {
  let given: Elite | undefined;
  for (;;) {
    const message = receiveMessageOnPort(receive) as { message: Elite } | undefined;
    if (!message) return given;
    if (message.message.run === run) given = message.message;
  }
}

/** Waits until the thread before has sent as often as this one. */
function waitForNeighbour({ sent, index, threads }: Place): void {
  const before = (index + threads - 1) % threads;
  for (;;) {
    const count = Atomics.load(sent, before);
    if (count >= Atomics.load(sent, index)) return;
    Atomics.wait(sent, before, count);
  }
}

/** Waiting for each other makes a run repeatable: then one plan is taken at each exchange. */
function exchangeOnce(place: Place, mine: Elite, inStep: boolean): Elite | undefined {
  place.send.postMessage(mine);
  Atomics.add(place.sent, place.index, 1);
  Atomics.notify(place.sent, place.index);
  if (!inStep) return latest(place, mine.run);
  waitForNeighbour(place);
  const next = receiveMessageOnPort(place.receive) as { message: Elite } | undefined;
  return next?.message;
}

/** Nobody waits for a thread that is through: told to stop, threads are not in step any more. */
function release({ sent, index }: Place): void {
  Atomics.store(sent, index, 2 ** 30);
  Atomics.notify(sent, index);
}

/** Sends the best plan on and takes over a better one, at even shares of the run. */
function exchange(order: Order, place: Place): OnProgress {
  const inStep = order.limit.kind === "turns";
  let next = EXCHANGE_FROM;
  let nextNews = NEWS_EVERY;
  return ({ share, best, elite }) => {
    if (share >= nextNews) {
      nextNews += NEWS_EVERY;
      parentPort?.postMessage({ kind: "news", share, rank: best } satisfies News);
    }
    if (share < next || place.threads < 2) return undefined;
    next += EXCHANGE_EVERY;
    const given = exchangeOnce(place, { run: order.run, routes: elite(), rank: best }, inStep);
    return given && given.rank < best ? given.routes : undefined;
  };
}

function run(order: Order, place: Place): Finish {
  const { problem, options, seed, limit } = order;
  const began = performance.now();
  const limited = stopAt(limit, place.threads);
  const stop: Stop = (iterations) =>
    Atomics.load(place.enough, 0) === 1 ? 1 : limited(iterations);
  const end = solve(problem, stop, seededRng(seed), options, exchange(order, place));
  release(place);
  const rank = end.cost.total + MISSED_RANK * end.missedMust.length;
  const seconds = (performance.now() - began) / 1000;
  return { kind: "finish", routes: end.routes, rank, iterations: end.iterations, seconds };
}

parentPort?.once("message", (place: Place) => {
  parentPort?.on("message", (order: Order) => parentPort?.postMessage(run(order, place)));
});
