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

  // Arithmetic on a made-up round: a and b 10 min apart at 10 km, b and c 20 min at 20 km, on one
  // meridian, so that every straight line is known without the code (1 degree of latitude, 111 km).
  const at = (time: string) => `2026-12-01T${time}:00.000Z`;
  const meridian = [
    { id: "a", position: 1, arrivesAt: at("08:30"), departsAt: at("09:00"), latitude: 52 },
    { id: "b", position: 2, arrivesAt: at("09:10"), departsAt: at("09:20"), latitude: 52.09 },
    { id: "c", position: 3, arrivesAt: at("09:40"), departsAt: at("09:50"), latitude: 52.27 },
  ];
  const pointOf = ({ latitude }: { latitude: number }) => ({ latitude, longitude: 0.1 });

  it("reckons the drives anew: those of the plan as they were, others at the round's pace", () => {
    const times = reordered(meridian, ["b", "a", "c"], pointOf).map((stop) => stop.arrivesAt);
    // b 08:30 to 08:40, the plan's 10 min to a, there until 09:20, then 30 km at 1 km a minute.
    expect(times).toEqual([at("08:30"), at("08:50"), at("09:50")]);
  });

  it("lets one long wait not slow the other drives", () => {
    const { latitude } = { latitude: 52.36 };
    const wait = { id: "d", position: 4, arrivesAt: at("11:50"), departsAt: at("12:00"), latitude };
    // d stands 10 km past c, but the plan waits there until 11:50.
    const [, , , last] = reordered([...meridian, wait], ["a", "b", "d", "c"], pointOf);
    // a and b as planned, b to d 30 km in 30 min, 10 min there; d to c is the plan's own two hours.
    expect(last?.arrivesAt).toBe(at("12:00"));
  });

  it("loses nothing, is the same done twice, and never runs backwards", () => {
    const degrees = fc.double({ min: -1, max: 1, noNaN: true });
    const visit = fc.record({
      ...{ gap: fc.nat(7200), stay: fc.nat(7200) },
      point: fc.option(fc.record({ latitude: degrees, longitude: degrees })),
    });
    const round = fc
      .array(visit, { minLength: 1, maxLength: 15 })
      .chain((visits) =>
        fc.tuple(fc.constant(visits), fc.shuffledSubarray(visits.map((_, n) => `stop-${n}`))),
      );
    fc.assert(
      fc.property(round, ([visits, wanted]) => {
        let clock = Date.parse("2026-12-01T08:00:00Z");
        const stops = visits.map(({ gap, stay, point }, n) => {
          const arrives = clock + gap * 1000;
          clock = arrives + stay * 1000;
          const arrivesAt = new Date(arrives).toISOString();
          return {
            ...{ id: `stop-${n}`, position: n + 1, arrivesAt, point },
            departsAt: new Date(clock).toISOString(),
          };
        });
        const once = reordered(stops, wanted, (stop) => stop.point);
        expect(once.map((stop) => stop.id).sort()).toEqual(stops.map((stop) => stop.id).sort());
        expect(once.map((stop) => stop.position)).toEqual(stops.map((_, n) => n + 1));
        expect(reordered(once, wanted, (stop) => stop.point)).toEqual(once);
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
