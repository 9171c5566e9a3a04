import type { ClaimLine } from "@/db/queries/forecast-claims";
import { chanceOutBy } from "@/lib/battery";
import type { StatedEnd } from "@/lib/stats/reliability";
import { fromEpochDays, MS_PER_DAY, toEpochDays } from "@/lib/units";

/** A claim held against what has come since. */
export interface HeldClaim extends ClaimLine {
  /** Until the pack's next claim, its end, or now: here this claim stood. */
  readonly stretch: StatedEnd;
  /** Until the pack's end, or now. */
  readonly life: StatedEnd;
  /** The first of this pack here. */
  readonly first: boolean;
  /** Dates said: 5th percentile, median, 95th. */
  readonly window: { readonly p05: Date; readonly p50: Date; readonly p95: Date };
  /** Median of the days left, as said. */
  readonly saidDays: number;
  /** Days that it lasted, so far where it still runs. */
  readonly foundDays: number;
}

/**
 * Holds each claim against what came. The chance of a stretch, summed as -ln(1 - chance) over
 * every pack that was watched, is the number of stops that the claims expect, whichever packs
 * came out and why (Aalen's compensator of a counting process; Andersen, Borgan, Gill & Keiding,
 * Statistical Models Based on Counting Processes, 1993, from memory).
 * @param lines in the order of their quarters
 */
export function holdClaims(lines: readonly ClaimLine[], now: Date): HeldClaim[] {
  const next = new Map<string, Date>();
  const firsts = new Map<string, ClaimLine>();
  const held = [...lines].reverse().map((line) => {
    const replaced = next.get(line.packId) ?? now;
    next.set(line.packId, line.madeAt);
    firsts.set(line.packId, line);
    return { line, stood: statedBy(line, replaced), life: statedBy(line, now) };
  });
  return held.reverse().map(({ line, stood, life }) => ({
    ...line,
    stretch: stood,
    life,
    first: firsts.get(line.packId) === line,
    ...daysOf(line, now),
  }));
}

/** The chance given to a stop until a moment or the end before it, and whether it stopped. */
function statedBy(line: ClaimLine, until: Date): StatedEnd {
  const over = line.endedAt !== null && line.endedAt <= until;
  const end = over && line.endedAt ? line.endedAt : until;
  return { chance: chanceOutBy(line, toEpochDays(end)), ended: over && line.stopped };
}

function daysOf({ cdfDays, madeAt, endedAt }: ClaimLine, now: Date) {
  // the distribution's points lie at 1 %, 3 %, ... 99 %
  const at = (index: number) => cdfDays[index] ?? 0;
  const middle = (at(24) + at(25)) / 2;
  const found = (endedAt ?? now).getTime() - madeAt.getTime();
  return {
    window: {
      p05: fromEpochDays(at(2)),
      p50: fromEpochDays(middle),
      p95: fromEpochDays(at(47)),
    },
    saidDays: Math.max(0, middle - toEpochDays(madeAt)),
    foundDays: Math.max(0, found / MS_PER_DAY),
  };
}
