/**
 * npm run bench:policy [-- --assets 300 --seeds a,b,c --years 3 --train d --json --write]
 * npm run bench:policy -- --first-plan
 *
 * Simulated years of the demonstration's fleet under four policies, each from the same start and
 * with the same crews, prices, roads and books. The simple ones are set on training seeds of
 * their own; the product knows only what its records would hold. --write keeps the results where
 * the Record page reads them.
 */
import { parseArgs } from "node:util";
import { firstPlanReport } from "./policy/first-plan";
import type { Result } from "./policy/ledger";
import { live } from "./policy/live";
import { writeRecord } from "./policy/record";
import { fixedInterval, inspectionThreshold, runToFailure } from "./policy/simple-policies";
import { type Start, startOf } from "./policy/start";
import { causeTable, mainTable, means, rowOf } from "./policy/table";
import { trainingLives } from "./policy/training";
import { tunedInspection, tunedInterval } from "./policy/tuned";
import { wanewright } from "./policy/wanewright";
import type { Policy } from "./policy/week";

const { values } = parseArgs({
  options: {
    assets: { type: "string", default: "300" },
    seeds: { type: "string", default: "test-1,test-2,test-3" },
    train: { type: "string", default: "train-1" },
    years: { type: "string", default: "3" },
    "first-plan": { type: "boolean", default: false },
    json: { type: "boolean", default: false },
    write: { type: "boolean", default: false },
  },
});

function whole(name: "assets" | "years", least: number): number {
  const value = Number(values[name]);
  if (Number.isInteger(value) && value >= least) return value;
  throw new Error(`--${name}: give a whole number of ${least} or more.`);
}

function names(name: "seeds" | "train"): string[] {
  const list = values[name].split(",").filter((seed) => seed !== "");
  if (list.length === 0) throw new Error(`--${name}: give at least one seed.`);
  return list;
}

function say(line: string): void {
  if (!values.json) process.stdout.write(`${line}\n`);
}

const size = { assets: whole("assets", 20), years: whole("years", 1) };
const start = (seed: string): Start => startOf(seed, size.assets, size.years);

/** The policies, the simple ones as the training seeds set them. */
function policies(): (() => Policy)[] {
  const starts = names("train").map(start);
  const lives = starts.flatMap(trainingLives);
  const intervals = tunedInterval(starts, lives);
  const inspections = tunedInspection(starts, lives);
  const ages = [...intervals.days].map(([m, d]) => `${m} ${Math.round(d)}`);
  say(`fixed intervals, days: ${ages}; along within ${intervals.alongDays} days`);
  const rules = [...inspections.byModel].map(
    ([m, r]) => `${m} ${Math.round(r.everyDays)}/${r.belowMv}`,
  );
  say(`inspections, days/mV: ${rules}; along within ${inspections.alongDays} days`);
  return [
    () => fixedInterval(intervals),
    () => inspectionThreshold(inspections),
    runToFailure,
    wanewright,
  ];
}

async function run(): Promise<void> {
  const shared = names("seeds").filter((seed) => names("train").includes(seed));
  if (shared.length > 0) throw new Error(`--train: ${shared.join(", ")} is a test seed too.`);
  say(`${size.assets} assets, ${size.years} years; seeds ${values.seeds}; set on ${values.train}`);
  const made = policies();
  const results: Result[] = [];
  for (const seed of names("seeds")) {
    const from = start(seed);
    for (const make of made) {
      const result = live(from, make());
      results.push(result);
      const pounds = result.costPerDeviceYear.toFixed(2);
      process.stderr.write(`${seed} ${result.policy}: £${pounds} a device-year\n`);
    }
  }
  const rows = [...results, ...means(results)];
  say(`\n${mainTable(rows)}\n\nPounds a device-year by cause\n\n${causeTable(rows)}`);
  if (values.json) process.stdout.write(`${JSON.stringify({ rows: results.map(rowOf) })}\n`);
  if (values.write) {
    const [seeds, setOn] = [names("seeds"), names("train")];
    const options = `--assets ${size.assets} --years ${size.years} --seeds ${values.seeds}`;
    const command = `npm run bench:policy -- ${options} --train ${values.train} --write`;
    await writeRecord({ command, ...size, seeds, setOn }, results);
  }
}

if (values["first-plan"]) say(firstPlanReport());
else await run();
