/**
 * The order's rules are the product's own, said in words in the module; what must hold of any order
 * (nothing lost, nothing twice, idempotent, times that never run backwards) is played with
 * random rounds.
 */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { mergeDay } from "@/lib/sync/merge-day";
import { orderedAs, reordered } from "@/lib/sync/round-order";
import { dayPack, outboxEntry } from "./day-fixture";

describe("an order of one's own", () => {
  it("leaves out what is gone, and keeps what was added behind the stop it stood behind", () => {
    expect(orderedAs(["a", "b", "new", "c"], ["c", "gone", "b", "a"])).toEqual([
      "c",
      "b",
      "new",
      "a",
    ]);
    expect(orderedAs(["new", "a"], ["a"])).toEqual(["new", "a"]);
    expect(orderedAs(["a", "b"], ["b", "b", "a"])).toEqual(["b", "a"]);
  });

  it("swaps two visits: each as long as it was, the drives where they were", () => {
    const at = (time: string) => `2026-12-01T${time}:00.000Z`;
    const stops = [
      { id: "a", position: 1, arrivesAt: at("08:30"), departsAt: at("09:00") },
      { id: "b", position: 2, arrivesAt: at("09:20"), departsAt: at("09:30") },
    ];
    expect(reordered(stops, ["b", "a"])).toEqual([
      { id: "b", position: 1, arrivesAt: at("08:30"), departsAt: at("08:40") },
      { id: "a", position: 2, arrivesAt: at("09:00"), departsAt: at("09:30") },
    ]);
  });

  it("loses nothing, is the same done twice, and never runs backwards", () => {
    const round = fc
      .array(fc.record({ gap: fc.nat(7200), stay: fc.nat(7200) }), { minLength: 1, maxLength: 15 })
      .chain((visits) =>
        fc.tuple(fc.constant(visits), fc.shuffledSubarray(visits.map((_, n) => `stop-${n}`))),
      );
    fc.assert(
      fc.property(round, ([visits, wanted]) => {
        let clock = Date.parse("2026-12-01T08:00:00Z");
        const stops = visits.map(({ gap, stay }, n) => {
          const arrives = clock + gap * 1000;
          clock = arrives + stay * 1000;
          const arrivesAt = new Date(arrives).toISOString();
          return {
            ...{ id: `stop-${n}`, position: n + 1, arrivesAt },
            departsAt: new Date(clock).toISOString(),
          };
        });
        const once = reordered(stops, wanted);
        expect(once.map((stop) => stop.id).sort()).toEqual(stops.map((stop) => stop.id).sort());
        expect(once.map((stop) => stop.position)).toEqual(stops.map((_, n) => n + 1));
        expect(reordered(once, wanted)).toEqual(once);
        const times = once.flatMap((stop) => [stop.arrivesAt, stop.departsAt]);
        expect([...times].sort()).toEqual(times);
        const said = once.map((stop) => stop.id).filter((id) => wanted.includes(id));
        expect(said.filter((id) => wanted.includes(id)).length).toBe(wanted.length);
      }),
    );
  });

  it("shows on the phone at once, and is taken back when it is refused", () => {
    const day = dayPack();
    const entry = outboxEntry(1, {
      ...{ kind: "reorder", roundId: "round", stopIds: ["stop-2", "stop-1"] },
    });
    const ids = (pack: typeof day) => pack.rounds[0]?.stops.map((stop) => stop.id);
    expect(ids(mergeDay(day, [entry]))).toEqual(["stop-2", "stop-1"]);
    expect(ids(mergeDay(day, [{ ...entry, state: "refused" }]))).toEqual(["stop-1", "stop-2"]);
  });
});
