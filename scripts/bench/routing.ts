/**
 * The routing engine on public instances, as gap to the best cost known.
 *
 *   tsx scripts/bench/routing.ts DIR [seconds] [--json] [--seeds N] [--threads N] [--only REGEXP] [--cpu]
 *
 * DIR holds instances in any of the formats of routing/instances.ts, in folders or not, and may
 * hold a bks.csv (columns set, instance, bks). Every plan is checked and priced by the independent
 * checker. --cpu counts processor time, for a machine that is busy with other work.
 */
import { assertProblem } from "../../lib/routing/assert-problem";
import { checkPlan } from "../../lib/routing/check";
import { bestKnown, listInstances, loadInstance, nameInTable, type Listed } from "./routing/folder";
import { Race, type Limit } from "../../lib/server/search-threads/race";

interface Row {
  readonly set: string;
  readonly instance: string;
  readonly seed: number;
  readonly cost: number;
  readonly bestKnown: number | null;
  readonly gapPct: number | null;
  readonly seconds: number;
}

interface Asked {
  readonly folder: string;
  readonly seconds: number;
  readonly json: boolean;
  readonly seeds: number;
  readonly threads: number;
  readonly only: RegExp;
  readonly cpu: boolean;
}

const VALUED = ["--seeds", "--threads", "--only"];

function readArguments(args: readonly string[]): Asked {
  const value = (name: string, otherwise: string) => {
    const at = args.indexOf(name);
    return at >= 0 ? (args[at + 1] ?? otherwise) : otherwise;
  };
  const plain = args.filter(
    (arg, i) => !arg.startsWith("--") && !VALUED.includes(args[i - 1] ?? ""),
  );
  const folder = plain[0];
  if (!folder) throw new Error("Name a folder of instances: routing.ts DIR [seconds] [--json]");
  return {
    folder,
    seconds: Number(plain[1] ?? 10),
    json: args.includes("--json"),
    seeds: Number(value("--seeds", "3")),
    threads: Number(value("--threads", "2")),
    only: new RegExp(value("--only", "")),
    cpu: args.includes("--cpu"),
  };
}

const say = (line: string) => void process.stdout.write(`${line}\n`);

async function measure(
  race: Race,
  listed: Listed,
  seed: number,
  asked: Asked,
  best: number | null,
) {
  const { problem, scale } = loadInstance(listed);
  assertProblem(problem);
  const { seconds, cpu } = asked;
  const limit: Limit = { kind: cpu ? "processor" : "seconds", seconds };
  const end = await race.run({ problem, options: {}, seed, limit });
  const spent = cpu ? seconds : end.seconds;
  const check = checkPlan(problem, end.routes);
  if (check.faults.length > 0 || check.missedMust > 0) {
    const what = JSON.stringify(check.faults.slice(0, 3));
    complain(`${listed.name}: no sound plan (${check.missedMust} missed, ${what})`);
  }
  const cost = check.cost / scale;
  const gapPct = best === null ? null : Number((100 * (cost / best - 1)).toFixed(3));
  const row: Row = {
    ...{ set: listed.set, instance: listed.name, seed, cost, bestKnown: best, gapPct },
    seconds: Number(spent.toFixed(2)),
  };
  return { row, iterations: end.iterations, sites: problem.sites.length };
}

/** A broken instance is named and passed over; the others are still measured. */
function complain(what: string): void {
  process.stderr.write(`${what}\n`);
  process.exitCode = 1;
}

async function measureAll(race: Race, listed: Listed, asked: Asked, best: number | null) {
  const measured = [];
  try {
    for (let seed = 1; seed <= asked.seeds; seed++) {
      measured.push(await measure(race, listed, seed, asked, best));
    }
  } catch (error) {
    complain(`${listed.name}: ${error instanceof Error ? error.message : String(error)}`);
  }
  return measured;
}

function sayMeans(gaps: ReadonlyMap<string, readonly number[]>): void {
  for (const [set, list] of gaps) {
    const mean = list.reduce((sum, gap) => sum + gap, 0) / list.length;
    say(`${set.padEnd(18)} mean gap ${mean.toFixed(2)} % over ${list.length} runs`);
  }
}

async function main(): Promise<void> {
  const asked = readArguments(process.argv.slice(2));
  const known = bestKnown(asked.folder);
  const race = new Race(asked.threads);
  const rows: Row[] = [];
  const gaps = new Map<string, number[]>();
  for (const listed of listInstances(asked.folder, asked.only)) {
    const best = known.get(nameInTable(listed)) ?? null;
    for (const { row, iterations, sites } of await measureAll(race, listed, asked, best)) {
      rows.push(row);
      const group = `${row.set}-${sites}`;
      if (row.gapPct !== null) gaps.set(group, [...(gaps.get(group) ?? []), row.gapPct]);
      if (asked.json) continue;
      const gap = row.gapPct === null ? "no best known" : `${row.gapPct.toFixed(2)} %`;
      const [name, seed] = [row.instance.padEnd(18), row.seed];
      say(`${name} seed ${seed}  ${row.cost}  ${gap}  ${iterations} iterations`);
    }
  }
  await race.close();
  if (asked.json) say(JSON.stringify({ rows }));
  else sayMeans(gaps);
}

await main();
