/**
 * Claims held against what came. Outside truth: for lives with a constant hazard and forecasts
 * that say so, the number of stops has the mean and the variance of its compensator, whatever
 * rule takes packs out early (optional stopping; Andersen, Borgan, Gill & Keiding, Statistical
 * Models Based on Counting Processes, 1993, from memory), and -ln(1 - F) is the hazard times the
 * time, a closed form.
 */
import { describe, expect, it } from "vitest";
import type { ClaimLine } from "@/db/queries/forecast-claims";
import { CDF_PROBABILITIES } from "@/lib/battery";
import { expectedEnds, reliabilityCurve } from "@/lib/stats/reliability";
import { fromEpochDays, toEpochDays } from "@/lib/units";
import { holdClaims } from "@/lib/usecases/held-claims";
import { quarterOf, quartersBetween } from "@/lib/usecases/quarters";
import { createRng } from "../../../scripts/simulate/prng";

const FIRST = toEpochDays(new Date("2025-01-01T04:00:00Z"));
const STEP = 91;
const MEAN_DAYS = 300;
const NOW = FIRST + 4 * STEP;

interface Pack {
  readonly id: string;
  readonly installedAt: number;
  readonly endedAt: number | null;
  readonly stopped: boolean;
}

/** What a forecast says that knows the hazard, times an error of its own. */
function cdfAt(from: number, meanDays: number): number[] {
  return CDF_PROBABILITIES.map((p) => from - meanDays * Math.log(1 - p));
}

function claimsOf(pack: Pack, meanSaid: number): ClaimLine[] {
  return [0, 1, 2, 3].flatMap((k) => {
    const at = FIRST + k * STEP;
    const runs = pack.installedAt < at && (pack.endedAt === null || pack.endedAt > at);
    if (!runs) return [];
    const named = { tag: pack.id, modelName: "m", crewName: null, designation: "LR20" };
    return [
      {
        ...named,
        ...{ packId: pack.id, quarter: String(k), chemistry: "alkaline", reasonOut: null },
        ...{ madeAt: fromEpochDays(at), keptAt: fromEpochDays(at), removedAt: null },
        installedAt: fromEpochDays(pack.installedAt),
        endedAt: pack.endedAt === null ? null : fromEpochDays(pack.endedAt),
        ...{ stopped: pack.stopped, cdfDays: cdfAt(at, meanSaid) },
      },
    ];
  });
}

/** Devices one pack after another; most run until they stop, some are swapped by the calendar. */
function fleet(devices: number): Pack[] {
  const rng = createRng("held claims");
  return Array.from({ length: devices }, (_, device) => {
    const interval = device % 4 === 0 ? 200 : Infinity;
    const packs: Pack[] = [];
    for (let from = FIRST - rng.uniform(0, 700); from < NOW;) {
      const life = -MEAN_DAYS * Math.log(1 - rng.next());
      const end = from + Math.min(life, interval);
      const known = end < NOW;
      const id = `${device}/${packs.length}`;
      packs.push({
        ...{ id, installedAt: from },
        ...{ endedAt: known ? end : null, stopped: known && life < interval },
      });
      from = end + 0.5;
    }
    return packs;
  }).flat();
}

const packs = fleet(1500);
const held = (meanSaid: number) => {
  const claims = packs.flatMap((pack) => claimsOf(pack, meanSaid));
  const inOrder = claims.sort((a, b) => a.quarter.localeCompare(b.quarter));
  return holdClaims(inOrder, fromEpochDays(NOW));
};

describe("stops against those expected", () => {
  const tally = (meanSaid: number) => {
    const stood = held(meanSaid).map((claim) => claim.stretch);
    return { stopped: stood.filter((s) => s.ended).length, expected: expectedEnds(stood) };
  };

  it("agree where forecasts are right, although most packs come out by stopping", () => {
    const { stopped, expected } = tally(MEAN_DAYS);
    expect(stopped).toBeGreaterThan(500);
    // 2.6 standard deviations of a Poisson count: one right program in a hundred would miss it
    expect(Math.abs(stopped - expected.mean)).toBeLessThan(2.6 * Math.sqrt(expected.mean));
  });

  it("show forecasts that say too late, and too early", () => {
    const late = tally(MEAN_DAYS * 1.3);
    expect(late.stopped).toBeGreaterThan(late.expected.mean + late.expected.spread);
    const early = tally(MEAN_DAYS / 1.3);
    expect(early.stopped).toBeLessThan(early.expected.mean - early.expected.spread);
  });

  it("would not agree over the packs that came out alone", () => {
    const out = held(MEAN_DAYS).filter((claim) => claim.endedAt !== null);
    const stood = out.map((claim) => claim.stretch);
    const expected = expectedEnds(stood);
    expect(stood.filter((s) => s.ended).length).toBeGreaterThan(expected.mean + expected.spread);
  });

  it("give a stretch the closed form's chance", () => {
    const claim = claimsOf({ id: "x", installedAt: FIRST - 5, endedAt: null, stopped: false }, 400);
    const [first] = holdClaims(claim, fromEpochDays(NOW));
    expect(first?.stretch.chance).toBeCloseTo(1 - Math.exp(-STEP / 400), 3);
    expect(first?.life.chance).toBeCloseTo(1 - Math.exp(-(NOW - FIRST) / 400), 3);
    // the middle of the points at 49 % and 51 %
    expect(first?.saidDays).toBeCloseTo(400 * Math.log(2), 0);
  });
});

it("whole lives lie on the diagonal where forecasts are right", () => {
  const firsts = held(MEAN_DAYS).filter((claim) => claim.first);
  for (const point of reliabilityCurve(firsts.map((claim) => claim.life))) {
    expect(Math.abs(point.observed - point.forecast)).toBeLessThan(0.04);
  }
});

describe("quarters", () => {
  it("begin in January, April, July and October", () => {
    expect(quarterOf("2026-03-31")).toBe("2026-01-01");
    expect(quarterOf("2026-12-01")).toBe("2026-10-01");
  });

  it("begin at four in the morning of the organisation", () => {
    const from = new Date("2026-02-01T00:00:00Z");
    const until = new Date("2026-12-01T00:00:00Z");
    const starts = quartersBetween(from, until, "Europe/Berlin").map(({ at }) => at.toISOString());
    expect(starts).toEqual([
      "2026-01-01T03:00:00.000Z",
      "2026-04-01T02:00:00.000Z",
      "2026-07-01T02:00:00.000Z",
      "2026-10-01T02:00:00.000Z",
    ]);
  });
});
