/** One thread of a race: see race.ts. */
import { parentPort, receiveMessageOnPort, type MessagePort } from "node:worker_threads";
import type { Routes } from "../../../lib/routing/problem";
import { seededRng } from "../../../lib/routing/rng";
import { solve, type OnProgress, type Stop } from "../../../lib/routing/solve";
import { loadInstance } from "./folder";
import type { Finish, Task } from "./race";

/** Share of the run between two exchanges, and before the first. */
const EXCHANGE_EVERY = 0.05;
const EXCHANGE_FROM = 0.3;

interface Elite {
  readonly task: string;
  readonly routes: Routes;
  readonly rank: number;
}

interface Ports {
  readonly receive: MessagePort;
  readonly send: MessagePort;
}

const nameOf = (task: Task) => `${task.instance.path} ${Math.floor(task.seed / 100)}`;

function stopAfter(task: Task): Stop {
  if (!task.cpu) {
    const from = performance.now();
    return () => (performance.now() - from) / 1000 / task.seconds;
  }
  const used = () => {
    const { user, system } = process.cpuUsage();
    return (user + system) / 1e6;
  };
  const from = used();
  return () => (used() - from) / (task.seconds * task.threads);
}

/** Sends the best plan on and takes over a better one, at even shares of the run. */
function exchange(task: Task, ports: Ports): OnProgress {
  let next = EXCHANGE_FROM;
  return ({ share, best, elite }) => {
    if (share < next || task.threads < 2) return undefined;
    next += EXCHANGE_EVERY;
    const mine: Elite = { task: nameOf(task), routes: elite(), rank: best };
    ports.send.postMessage(mine);
    let given: Elite | undefined;
    for (;;) {
      const message = receiveMessageOnPort(ports.receive) as { message: Elite } | undefined;
      if (!message) break;
      if (message.message.task === mine.task) given = message.message;
    }
    return given && given.rank < best ? given.routes : undefined;
  };
}

function run(task: Task, ports: Ports): Finish {
  const { problem } = loadInstance(task.instance);
  const stop = stopAfter(task);
  const end = solve(problem, stop, seededRng(task.seed), {}, exchange(task, ports));
  const rank = end.cost.total + 1e12 * end.missedMust.length;
  return { routes: end.routes, rank, iterations: end.iterations };
}

parentPort?.once("message", (ports: Ports) => {
  parentPort?.on("message", (task: Task) => parentPort?.postMessage(run(task, ports)));
});
