/**
 * The rules are the ("sent in order", "one refused entry does not block the others",
 * "whatever is repeated, reordered or cut off"); the waits are checked against the arithmetic of
 * doubling (common practice, no source).
 */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { EntryBody } from "@/lib/sync/entries";
import {
  heldBy,
  nextBatch,
  type OutboxEntry,
  prunable,
  released,
  settled,
  taken,
  waitMs,
  withDependents,
} from "@/lib/sync/outbox";

const ME = "me";

function entry(seq: number, body: Partial<EntryBody> & { kind: string }, more = {}): OutboxEntry {
  return {
    ...{ seq, id: `e${seq}`, personId: ME, happenedAt: "2026-12-01T09:00:00Z" },
    body: body as EntryBody,
    ...{ state: "kept", attempts: 0, refusal: null, appliedAt: null },
    ...more,
  };
}
const reading = (seq: number, assetId: string, packId: string, more = {}) =>
  entry(seq, { kind: "reading", assetId, packId }, more);
const swap = (seq: number, assetId: string, oldPackId: string, newPackId: string, more = {}) =>
  entry(seq, { kind: "swap", assetId, oldPackId, newPackId }, more);
const ids = (entries: readonly OutboxEntry[]) => entries.map((e) => e.id);
const said = (id: string, outcome: "applied" | "refused" | "later", code = "conflict") => ({
  ...{ id, outcome },
  refusal: outcome === "applied" ? null : { code, message: "", faults: [] },
});

describe("what goes next", () => {
  it("is this person's, in the order made, so many at a time", () => {
    const entries = [
      ...[reading(3, "a", "p"), reading(1, "a", "p"), reading(2, "b", "q", { personId: "other" })],
      ...[reading(4, "a", "p", { state: "applied" }), reading(5, "a", "p")],
    ];
    expect(ids(nextBatch(entries, ME))).toEqual(["e1", "e3", "e5"]);
    expect(ids(nextBatch(entries, ME, new Set(), 2))).toEqual(["e1", "e3"]);
  });

  it("leaves behind what rests on a refused swap, however far, and nothing else", () => {
    const refused = swap(1, "a", "p0", "p1", { state: "refused" });
    const entries = [
      refused,
      ...[reading(2, "a", "p1"), swap(3, "a", "p1", "p2"), reading(4, "a", "p2")],
      ...[reading(5, "a", "p0"), reading(6, "b", "q")],
    ];
    expect(ids(nextBatch(entries, ME))).toEqual(["e5", "e6"]);
    expect(heldBy(entries, entries[1]!)?.id).toBe("e1");
    expect(ids(withDependents(entries, refused))).toEqual(["e1", "e2", "e3", "e4"]);
  });

  it("holds back what is about something that waits", () => {
    const entries = [reading(1, "a", "p"), reading(2, "b", "q")];
    expect(ids(nextBatch(entries, ME, new Set(["asset:a"])))).toEqual(["e2"]);
  });
});

describe("what becomes of an entry", () => {
  it("never changes again once it is applied, whatever comes late", () => {
    const outcome = fc.constantFrom(
      said("e1", "applied"),
      said("e1", "refused"),
      said("e1", "later"),
    );
    const act = fc.oneof(
      outcome.map((o) => (e: OutboxEntry) => settled(e, o, "2026-12-01T10:00:00Z", "not_yours")),
      fc.constant(released),
    );
    fc.assert(
      fc.property(fc.array(act), (acts) => {
        const applied = settled(
          taken(reading(1, "a", "p")),
          said("e1", "applied"),
          "t",
          "not_yours",
        );
        expect(acts.reduce((e, change) => change(e), applied)).toEqual(applied);
      }),
    );
  });

  it("is kept when it must wait, or is somebody else's to send", () => {
    const sending = taken(reading(1, "a", "p"));
    expect(settled(sending, said("e1", "later"), "t", "not_yours").state).toBe("kept");
    expect(settled(sending, said("e1", "refused", "not_yours"), "t", "not_yours").state).toBe(
      "kept",
    );
    expect(settled(sending, said("e1", "refused"), "t", "not_yours").state).toBe("refused");
    expect(released(sending)).toMatchObject({ state: "kept", attempts: 1 });
  });

  it("leaves the phone only when a day made after it was applied has come", () => {
    const applied = reading(1, "a", "p", { state: "applied", appliedAt: "2026-12-01T10:00:00Z" });
    expect(prunable(applied, "2026-12-01T10:00:01Z", ME)).toBe(true);
    expect(prunable(applied, "2026-12-01T10:00:00Z", ME)).toBe(false);
    expect(prunable(applied, "2026-12-01T10:00:01Z", "other")).toBe(false);
    expect(prunable(reading(1, "a", "p"), "2026-12-01T10:00:01Z", ME)).toBe(false);
  });
});

it("waits double as long after each failure, half of it by chance, five minutes at most", () => {
  expect([0, 1, 2, 3].map((n) => waitMs(n, 1))).toEqual([0, 2000, 4000, 8000]);
  expect([1, 2, 3].map((n) => waitMs(n, 0))).toEqual([1000, 2000, 4000]);
  expect(waitMs(50, 1)).toBe(300_000);
});
