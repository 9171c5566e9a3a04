import { describe, expect, it } from "vitest";
import { preparePlan } from "@/lib/planning/plan";
import { evenLife, MONDAY, pack, planInput, site } from "./district";

/** One site: a pack that is due, and one with a wide window that is not. */
function tasksWhenReadingTakes(readS: number, silenceMinorPerHour = 60) {
  const prepared = preparePlan(
    planInput({
      sites: [site(0)],
      packs: [
        pack(0, "site-0", { life: evenLife(MONDAY, 1, 10) }),
        pack(1, "site-0", { life: evenLife(MONDAY, 90, 400), readS, silenceMinorPerHour }),
      ],
    }),
  );
  return prepared.visits[0]!.tasks.map(({ kind, assetId }) => `${kind} ${assetId}`);
}

describe("voltages taken on the way", () => {
  // Common sense, no source: a reading cannot save more than not knowing costs.
  it("are taken where they may save more than their minutes cost", () => {
    expect(tasksWhenReadingTakes(120)).toEqual(["swap asset-0", "read asset-1"]);
  });

  it("are left alone where the minutes cost more", () => {
    expect(tasksWhenReadingTakes(7200)).toEqual(["swap asset-0"]);
  });

  it("are left alone where a failure costs nothing", () => {
    expect(tasksWhenReadingTakes(120, 0)).toEqual(["swap asset-0"]);
  });
});
