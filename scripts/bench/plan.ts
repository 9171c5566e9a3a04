/**
 * `npm run bench:plan [-- --json] [--still]`: the planner on invented fleets of growing size, and how still
 * a published plan stays when one pack in a hundred changes. No database: what the worker does
 * between reading and writing. --still leaves the growing fleets out.
 */
import { disturbanceRow, type DisturbanceRow } from "./plan/disturbance";
import { scaleRow, type ScaleRow } from "./plan/scale";

const SIZES = [1_250, 2_500, 5_000, 10_000];
const WEEKS = 4;
const SEEDS = [1, 2, 3, 4, 5, 6];
/** One pack in a hundred. */
const CHANGED = 0.01;
const DISTURBED_ASSETS = 2_500;

async function main(): Promise<void> {
  const sizes = process.argv.includes("--still") ? [] : SIZES;
  const scale: ScaleRow[] = [];
  for (const assets of sizes) scale.push(await scaleRow(assets, WEEKS));
  const disturbance: DisturbanceRow[] = [];
  for (const seed of SEEDS) disturbance.push(await disturbanceRow(seed, DISTURBED_ASSETS, CHANGED));
  if (process.argv.includes("--json")) {
    console.log(JSON.stringify({ scale, disturbance }));
    return;
  }
  const [least] = scale;
  console.log(`First plan of ${WEEKS} weeks; times relative to ${SIZES[0]} assets in brackets`);
  for (const row of scale) {
    const ratio = (row.planSeconds / least!.planSeconds).toFixed(2);
    const actRatio = (row.actMs / least!.actMs).toFixed(2);
    console.log(
      `  ${row.assets} assets, ${row.technicians} technicians: ${row.planSeconds.toFixed(1)} s (${ratio} ×), ` +
        `${row.visited} of ${row.offered} sites; an act ${row.actMs.toFixed(1)} ms (${actRatio} ×); ` +
        `${row.rssMiB.toFixed(0)} MiB`,
    );
  }
  console.log(
    `${CHANGED * 100} % of ${DISTURBED_ASSETS} packs changed, planned again from published rounds`,
  );
  for (const row of disturbance) {
    console.log(
      `  seed ${row.seed}: ${row.changedPacks} packs changed; of ${row.visits} visits ${row.moved} moved, ` +
        `${row.dropped} dropped (${(row.movedShare * 100).toFixed(1)} %), ${row.added} new; ` +
        `${(row.overFreePlan * 100).toFixed(2)} % dearer than a plan sought anew`,
    );
  }
}

await main();
