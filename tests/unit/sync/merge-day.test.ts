/**
 * Issue wording: "done stops show done" whether or not they were sent. Counts are the arithmetic
 * of what was entered: cells in a pack are series times parallel.
 */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { clockSkewMs, correctedInstant, recordedSkewMs } from "@/lib/sync/clock-skew";
import { loadOfRound } from "@/lib/sync/load-of-round";
import { mergeDay } from "@/lib/sync/merge-day";
import type { OutboxEntry } from "@/lib/sync/outbox";
import { BODY, dayPack, outboxEntry } from "./day-fixture";

const day = dayPack();
const stopOf = (merged: typeof day, n: number) => merged.rounds[0]?.stops[n];

describe("laying entries over the day", () => {
  it("does not touch the day itself", () => {
    const before = structuredClone(day);
    mergeDay(day, [outboxEntry(1, BODY.swap), outboxEntry(2, BODY.cannot)]);
    expect(day).toEqual(before);
  });

  it("a swap finishes its stop, fits the pack and takes its cells from the van", () => {
    const merged = mergeDay(day, [outboxEntry(1, BODY.swap)]);
    expect(stopOf(merged, 0)).toMatchObject({ state: "done", tasks: [{ state: "done" }] });
    expect(merged.rounds[0]?.state).toBe("started");
    const pack = merged.assets[0]?.pack;
    expect(pack).toMatchObject({ id: "new", lotCode: "LOT-1", forecast: null });
    expect(pack?.readings).toMatchObject([{ millivolts: 3100, kind: "loaded" }]);
    expect(merged.van?.lots[0]?.cells).toBe(8);
  });

  it("a swap ends what was said of the old pack: nobody is told to swap it again", () => {
    const worth = { standing: "due", savesMinor: 900, laterDay: "2027-01-10" } as const;
    const assets = day.assets.map((asset) => ({ ...asset, worth }));
    const merged = mergeDay({ ...day, assets }, [outboxEntry(1, BODY.swap)]);
    expect(merged.assets.map((asset) => asset.worth)).toEqual([null, worth]);
  });

  it("only the last of several orders of a round is laid over it", () => {
    const order = (seq: number, stopIds: string[]) =>
      outboxEntry(seq, { kind: "reorder", roundId: "round", stopIds });
    const last = order(2, ["stop-2", "stop-1"]);
    const both = mergeDay(day, [order(1, ["stop-1", "stop-2"]), last]);
    expect(both).toEqual(mergeDay(day, [last]));
  });

  it("a reading is added once, in order, and leaves a planned swap open", () => {
    const late = outboxEntry(1, BODY.reading, "2026-12-01T12:00:00Z");
    const early = outboxEntry(2, BODY.reading, "2026-12-01T10:00:00Z");
    const merged = mergeDay(day, [late, early]);
    const again = mergeDay(merged, [late, early]);
    const at = merged.assets[0]?.pack?.readings.map((r) => r.atDay) ?? [];
    expect(at).toEqual([...at].sort((a, b) => a - b));
    expect(again).toEqual(merged);
    expect(stopOf(merged, 0)?.state).toBe("planned");
  });

  it("what was refused, or is another's, did not happen", () => {
    const refused = { ...outboxEntry(1, BODY.swap), state: "refused" as const };
    const other = { ...outboxEntry(2, BODY.cannot), personId: "other" };
    expect(mergeDay(day, [refused, other])).toEqual(day);
  });

  it("what the server has seen already changes nothing more (any entries, any order)", () => {
    const bodies = fc.constantFrom(...Object.values(BODY));
    fc.assert(
      fc.property(fc.array(bodies, { maxLength: 8 }), (made) => {
        const entries = made.map((body, n): OutboxEntry => outboxEntry(n, body));
        const once = mergeDay(day, entries);
        expect(mergeDay(once, entries)).toEqual(once);
      }),
    );
  });
});

describe("the load", () => {
  it("counts whole packs from single lots, and what is done no longer", () => {
    const [round] = day.rounds;
    if (!round) throw new Error("no round");
    expect(loadOfRound(day, round)).toMatchObject({
      cells: [{ designation: "LR20", needed: 4, inVan: 10, packsShort: 0 }],
      keys: ["14"],
    });
    const few = {
      ...day,
      van: day.van && { ...day.van, lots: [{ ...day.van.lots[0]!, cells: 3 }] },
    };
    // Three cells fill one pack of two; the other is short although one cell is left.
    expect(loadOfRound(few, round).cells[0]?.packsShort).toBe(1);
    const merged = mergeDay(day, [outboxEntry(1, BODY.swap)]);
    expect(loadOfRound(merged, merged.rounds[0]!).cells[0]?.needed).toBe(2);
  });
});

describe("the phone's clock", () => {
  const received = new Date("2026-12-01T12:00:00Z");
  it("is taken out when it is off, left alone when it is not, and never leads to the future", () => {
    const at = (iso: string) => new Date(iso);
    const ahead = clockSkewMs(at("2026-12-02T12:00:00Z"), received);
    expect(ahead).toBe(86_400_000);
    expect(correctedInstant(at("2026-12-02T09:00:00Z"), ahead, received)).toEqual(
      at("2026-12-01T09:00:00Z"),
    );
    expect(correctedInstant(at("2026-12-01T09:00:00Z"), 40_000, received)).toEqual(
      at("2026-12-01T09:00:00Z"),
    );
    expect(correctedInstant(at("2026-12-01T15:00:00Z"), 0, received)).toEqual(received);
  });
  it("is recorded within three weeks, which an integer column of milliseconds holds", () => {
    expect(recordedSkewMs(1e12)).toBe(21 * 86_400_000);
    expect(recordedSkewMs(-1e12)).toBeGreaterThan(-(2 ** 31));
  });
});
