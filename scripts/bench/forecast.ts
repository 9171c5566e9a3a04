/**
 * npm run bench:forecast [-- --devices 300 --seed NAME --chemistry a,b --json]
 *
 * Forecasts scored at visit dates on two families of simulated devices, beside three simpler
 * methods in the same run. Every number comes from this run; nothing is stored.
 */
import { parseArgs } from "node:util";
import { CHEMISTRIES, type Chemistry } from "../../lib/battery/pack";
import { familyA } from "./forecast/family-a";
import { familyB } from "./forecast/family-b";
import { METHODS } from "./forecast/methods";
import { score, type Score } from "./forecast/score";
import { taughtTrials } from "./forecast/teach";

const FAMILIES = { "two wells": familyA, diffusion: familyB } as const;

export interface ForecastRow extends Score {
  readonly chemistry: Chemistry;
  readonly family: string;
  readonly method: string;
}

const { values } = parseArgs({
  options: {
    devices: { type: "string", default: "300" },
    seed: { type: "string", default: "proof-1" },
    chemistry: { type: "string", default: CHEMISTRIES.join(",") },
    json: { type: "boolean", default: false },
  },
});

function chosenChemistries(): Chemistry[] {
  const names = values.chemistry.split(",");
  const known = CHEMISTRIES.filter((c) => names.includes(c));
  if (known.length !== names.length) {
    throw new Error(`--chemistry: use some of ${CHEMISTRIES.join(", ")}, joined by commas.`);
  }
  return known;
}

function line(row: ForecastRow): string {
  const figures = [row.coverage80, row.biasAtEmpty, row.crps50, row.crps75, row.crps90];
  const cells = [
    row.chemistry,
    row.family,
    row.method,
    String(row.devices),
    ...figures.map((x) => x.toFixed(3)),
    row.alphaLambda50.toFixed(2),
  ];
  return `| ${cells.join(" | ")} |`;
}

function run(): void {
  const count = Number(values.devices);
  if (!Number.isInteger(count) || count < 2)
    throw new Error("--devices: give a whole number of 2 or more.");
  const rows: ForecastRow[] = [];
  if (!values.json) {
    console.log(`seed ${values.seed}, ${count} devices a chemistry and family`);
    console.log(
      "| chemistry | family | method | devices | coverage80 | biasAtEmpty | crps50 | crps75 | crps90 | alphaLambda50 |",
    );
    console.log("|---|---|---|---|---|---|---|---|---|---|");
  }
  for (const chemistry of chosenChemistries()) {
    for (const [family, simulate] of Object.entries(FAMILIES)) {
      const trials = taughtTrials(simulate(chemistry, count, values.seed));
      for (const [method, judge] of Object.entries(METHODS)) {
        const row = { chemistry, family, method, ...score(judge, trials) };
        rows.push(row);
        if (!values.json) console.log(line(row));
      }
    }
  }
  if (values.json) console.log(JSON.stringify({ rows }));
}

run();
