/** Counts by hand: two stops of one pack of two LR20 each, ten LR20 of one lot in the van. */
import { expect, it } from "vitest";
import { checkLoad } from "@/lib/sync/load-of-round";
import { dayPack } from "./day-fixture";

const day = dayPack();
const round = day.rounds[0];
if (!round) throw new Error("no round");
const check = (counted: Record<string, number>) => {
  const { lines, stopsReached, stopsShort } = checkLoad(day, round, counted);
  const ids = (stops: typeof stopsReached) => stops.map((stop) => stop.id);
  return { line: lines[0], reached: ids(stopsReached), short: ids(stopsShort) };
};

it("takes the books where nothing was counted", () => {
  expect(check({})).toMatchObject({
    line: { needed: 4, found: 10, packsShort: 0 },
    ...{ reached: ["stop-1", "stop-2"], short: [] },
  });
});

it("says which stops a short count still reaches, in the order of the round", () => {
  expect(check({ lr20: 3 })).toMatchObject({
    line: { found: 3, packsShort: 1 },
    ...{ reached: ["stop-1"], short: ["stop-2"] },
  });
  expect(check({ lr20: 0 })).toMatchObject({ line: { packsShort: 2 }, reached: [] });
});
