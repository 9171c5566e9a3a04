/**
 * The dates on which a device stops where cold can stop it early. Which winter it is hangs on
 * weather to come: each month draws its own coldest hour, and a pack that one frost would stop may
 * outlive three mild winters. So the dates are a mixture: over the time left, over the resistance
 * (which stays with the pack) and, month after month, over the chance that this month's coldest
 * hour brings the voltage under the cut-off at the depth reached by then.
 */
import type { EpochDays } from "../units";
import { MONTH_STARTS, dayOfYear, monthOf } from "./climate";
import type { EndNodes } from "./end-of-life";
import type { TimeLeft } from "./time-left";

/** Steps into which a month is cut: in the next years, and after them. */
const FINE_STEPS = 4;
const FINE_MONTHS = 48;
const DONE = 0.9995;
/** With less than this the evidence leaves nothing to go by. */
const LEAST_MASS = 1e-6;

/** Chance of having stopped by each of some days, both ascending. */
export interface StopCurve {
  readonly days: readonly EpochDays[];
  readonly chances: readonly number[];
}

export interface Course {
  /** A day on which it ran or was put in, and the last that is looked at. */
  readonly from: EpochDays;
  readonly until: EpochDays;
  /** Even days used up by a date, the cold apart. */
  progress(date: EpochDays): number;
  readonly daysPerDepth: number;
  /** End depth on which the time left was counted. */
  readonly warm: number;
}

/** When a pack with this time left stops. */
export function coldStops(left: TimeLeft, nodes: EndNodes, course: Course): StopCurve {
  const days = [course.from];
  const chances = [0];
  const packs = nodes.resistances.map(({ weight, months }) => {
    const lost = months.map((ends) => ends.map((end) => (course.warm - end) * course.daysPerDepth));
    return new Alive(left, weight, course.progress(course.from), { lost, ...nodes });
  });
  const total = packs.reduce((sum, pack) => sum + pack.total(), 0);
  if (!(total > LEAST_MASS)) return { days: [course.from, course.until], chances: [0, 0] };
  let from = course.from;
  for (let k = 0; from < course.until && chances.at(-1)! < DONE; k++) {
    const to = Math.min(course.until, nextMonth(from));
    const steps = k < FINE_MONTHS ? FINE_STEPS : 1;
    const before = chances.at(-1)!;
    const stopped = new Float64Array(steps);
    const marks = Array.from({ length: steps + 1 }, (_, s) => from + ((to - from) * s) / steps);
    const reached = marks.map(course.progress);
    const stretch = { month: monthOf(from + 1e-6), reached, part: Math.min(1, (to - from) / 28) };
    for (const pack of packs) pack.through(stretch, stopped);
    for (let s = 0; s < steps; s++) {
      days.push(marks[s + 1]!);
      chances.push(Math.max(chances.at(-1)!, Math.min(1, before + stopped[s]! / total)));
    }
    from = to;
  }
  return { days, chances };
}

function nextMonth(day: EpochDays): EpochDays {
  const inYear = dayOfYear(day + 1e-6);
  return day + Math.max(MONTH_STARTS[monthOf(day + 1e-6) + 1]! - inYear, 1e-3) + 1e-6;
}

interface Stretch {
  readonly month: number;
  /** Even days used up at its start and after each of its steps. */
  readonly reached: readonly number[];
  /** Share of the month that it is: the coldest hour comes in it with that chance. */
  readonly part: number;
}

interface Frosts {
  readonly severities: readonly number[];
  /** Even days that the cold takes away, by month and severity, mild to cold. */
  readonly lost: readonly (readonly number[])[];
}

/** What is still running, at one resistance: mass over even days left. */
class Alive {
  private readonly mass: Float64Array;
  private readonly sums: Float64Array;
  /** The first bin that holds anything. */
  private first = 0;

  constructor(
    private readonly left: TimeLeft,
    weight: number,
    reached: number,
    private readonly frosts: Frosts,
  ) {
    // it ran at the start: what even the mildest hour would have stopped by then is not it
    const least = reached + Math.min(...frosts.lost.flat());
    this.mass = left.mass.map((m, i) => (left.from + i * left.step > least ? m * weight : 0));
    this.sums = new Float64Array(this.mass.length);
    this.addUp();
  }

  total(): number {
    return this.sums[this.sums.length - 1]!;
  }

  private addUp(): void {
    let sum = 0;
    for (let i = 0; i < this.mass.length; i++) this.sums[i] = sum += this.mass[i]!;
  }

  /** Mass of at most so many days left; each bin's lies evenly around its middle. */
  private below(days: number): number {
    const place = (days - this.left.from) / this.left.step + 0.5;
    if (!(place > 0)) return 0;
    const whole = Math.floor(place);
    if (whole >= this.mass.length) return this.total();
    return (whole > 0 ? this.sums[whole - 1]! : 0) + (place - whole) * this.mass[whole]!;
  }

  /** Lets a stretch pass; adds what has stopped by the end of each of its steps. */
  through({ month, reached, part }: Stretch, stopped: Float64Array): void {
    const lost = this.frosts.lost[month]!;
    const steps = reached.length - 1;
    const by = (used: number): number =>
      lost.reduce((sum, days, k) => sum + this.frosts.severities[k]! * this.below(used + days), 0);
    const atStart = by(reached[0]!);
    for (let s = 1; s <= steps; s++) {
      // what the frost alone stops, it stops on any of the month's days
      stopped[s - 1]! += (atStart * part * s) / steps + by(reached[s]!) - atStart;
    }
    this.leave(lost, reached[0]!, reached[steps]!, part);
  }

  /** Takes out what has stopped: only what the coldest hour could reach is looked at. */
  private leave(lost: readonly number[], start: number, end: number, part: number): void {
    const { left, mass } = this;
    const { severities } = this.frosts;
    const farthest = (end + Math.max(...lost) - left.from) / left.step + 0.5;
    const last = Math.min(mass.length - 1, Math.floor(farthest));
    for (let i = this.first; i <= last; i++) {
      const place = i - 0.5 + left.from / left.step;
      let gone = 0;
      for (let k = 0; k < lost.length; k++) {
        const before = within((start + lost[k]!) / left.step - place);
        const after = within((end + lost[k]!) / left.step - place);
        gone += severities[k]! * (before * part + after - before);
      }
      mass[i]! *= Math.max(0, 1 - gone);
      if (mass[i] === 0 && i === this.first) this.first++;
    }
    if (last >= this.first) this.addUp();
  }
}

const within = (x: number): number => (x < 0 ? 0 : x > 1 ? 1 : x);
