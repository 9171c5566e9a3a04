import { describe, expect, it } from "vitest";
import { loadCells, loadGear, type LotOnHand } from "@/lib/planning/load-list";

const lot = (
  code: string,
  madeOn: string | null,
  cells: number,
  cellTypeId = "LR20",
): LotOnHand => ({
  lotId: code,
  code,
  cellTypeId,
  madeOn,
  receivedOn: "2026-06-01",
  cells,
});
const packOf = (tag: string, cells: number, cellTypeId = "LR20") => ({
  assetId: tag,
  tag,
  cellTypeId,
  cells,
});

// Rules: first in, first out by date code; the cells of a pack of one lot (IEC 60086-5, advice
// against mixing cells of different age, from memory).
describe("the cells of a load list", () => {
  it("takes the oldest date code first", () => {
    const load = loadCells(
      [packOf("A", 4), packOf("B", 4)],
      [lot("new", "2026-05-01", 40), lot("old", "2025-02-01", 8)],
    );
    expect(load.lines.map((l) => [l.lotCode, l.cells])).toEqual([["old", 8]]);
  });

  it("never splits a pack over two lots", () => {
    const load = loadCells(
      [packOf("A", 4), packOf("B", 4)],
      [lot("old", "2025-02-01", 6), lot("new", "2026-05-01", 6)],
    );
    expect(load.lines.map((l) => [l.lotCode, l.cells, l.forTags])).toEqual([
      ["old", 4, ["A"]],
      ["new", 4, ["B"]],
    ]);
    expect(load.shortages).toEqual([]);
  });

  it("says what is short instead of mixing lots", () => {
    const load = loadCells([packOf("A", 4)], [lot("x", null, 3), lot("y", null, 3)]);
    expect(load.lines).toEqual([]);
    expect(load.shortages).toEqual([{ cellTypeId: "LR20", cells: 4, forTags: ["A"] }]);
  });

  it("lists keys, tickets and gear once each", () => {
    const at = (keyCode: string | null, tickets: ("height" | "boat")[]) => ({
      keyCode,
      tickets,
      hazards: [],
    });
    const gear = loadGear([at("14", ["height"]), at(null, []), at("14", ["boat", "height"])]);
    expect(gear.keys).toEqual(["14"]);
    expect(gear.tickets).toEqual(["height", "boat"]);
  });
});
