/**
 * All that finished packs teach about those still in, put together: the end (end-lesson.ts),
 * lives by cohort and device (fleet-prior.ts), the voltage curve (curve-lesson.ts). Histories
 * are learned from by chemistry; a cohort nobody has seen the end of gets what its chemistry
 * taught.
 */
import type { EpochDays } from "../units";
import { ASSUMED } from "./assumptions";
import { DAYS_PER_YEAR } from "./climate";
import { calibrate, endScores } from "./calibration";
import { learnCurves } from "./curve-lesson";
import { endUnder, learnEnds, paceTo, paceTold, type Spent, spent } from "./end-lesson";
import { expectedLife } from "./expected-life";
import {
  type CohortLife,
  cohortPrior,
  devicePrior,
  type FinishedPack,
  learnCohorts,
  pooledLife,
} from "./fleet-prior";
import type {
  Calibration,
  Chemistry,
  FleetPrior,
  LoggedTemperature,
  PackReading,
  PackSpec,
} from "./pack";

/** Forecasts of this many packs are judged: enough to know a spread to a few percent. */
const MOST_JUDGED = 200;

export interface FinishedHistory {
  readonly packKey: string;
  readonly deviceKey: string;
  readonly cohort: string;
  readonly lot: string | null;
  readonly pack: PackSpec;
  readonly readings: readonly PackReading[];
  /** The day it stopped its device, or was swapped before that. */
  readonly outAt: EpochDays;
  readonly ranOut: boolean;
  /** Temperatures logged at its site, if any. */
  readonly temperatures?: readonly LoggedTemperature[];
}

export interface FleetMember {
  readonly deviceKey: string;
  readonly cohort: string;
  readonly chemistry: Chemistry;
  /** When the device or its firmware last changed, if ever: earlier packs told of another draw. */
  readonly changedAt?: EpochDays | null;
}

export interface FleetLesson {
  /** What is known beforehand of the next pack of a device; null where nothing is. */
  priorFor(member: FleetMember): FleetPrior | null;
}

/** Learn from every pack that came out. */
export function learnFleet(histories: readonly FinishedHistory[]): FleetLesson {
  const chemistries = groupBy(histories, (h) => h.pack.cell.chemistry);
  const lessons = new Map([...chemistries].map(([key, group]) => [key, learnChemistry(group)]));
  return { priorFor: (member) => lessons.get(member.chemistry)?.(member) ?? null };
}

function groupBy<Item, Key>(items: readonly Item[], key: (item: Item) => Key): Map<Key, Item[]> {
  const groups = new Map<Key, Item[]>();
  for (const item of items) {
    const group = groups.get(key(item));
    if (group) group.push(item);
    else groups.set(key(item), [item]);
  }
  return groups;
}

type PriorFor = (member: Omit<FleetMember, "chemistry">) => FleetPrior | null;

interface Told {
  readonly history: FinishedHistory;
  readonly spent: Spent;
}

/** A history counts when its pack was in at all. */
function prepared(histories: readonly FinishedHistory[]): Told[] {
  return histories
    .filter((h) => h.outAt - h.pack.installedAt > 1)
    .map((history) => ({
      history,
      spent: spent(history.pack, history.outAt, history.temperatures),
    }));
}

/** What was learned of one chemistry, its windows not yet calibrated. */
interface Raw {
  readonly told: readonly Told[];
  readonly finished: readonly FinishedPack[];
  /** The life of a cohort, or of the chemistry where its own was not seen. */
  lifeOf(cohort: string): CohortLife | null;
  /** Curve and end added to what is known of the life. */
  withLesson(cohort: string, prior: FleetPrior, curves?: Curves): FleetPrior;
  endOf(cohort: string): number;
}

type Curves = ReturnType<typeof learnCurves>;

function learnRaw(told: readonly Told[]): Raw {
  const ranOut = groupBy(
    told.filter(({ history }) => history.ranOut),
    ({ history }) => history.cohort,
  );
  const ends = learnEnds(
    new Map([...ranOut].map(([cohort, packs]) => [cohort, packs.map((p) => p.spent)])),
  );
  const endOf = (cohort: string): number => ends.get(cohort) ?? 1;
  const finished = told.map((one) => finishedPack(one, endOf(one.history.cohort)));
  const own = learnCohorts(finished).map((life) => ({
    ...life,
    ...meansOf(finished, told, life.cohort),
  }));
  const pooled = pooledLife(own);
  const lives = new Map(own.map((life) => [life.cohort, life]));
  const learned = learnCurves(told, endOf);
  return {
    told,
    finished,
    endOf,
    lifeOf: (cohort) => lives.get(cohort) ?? pooled,
    withLesson: (cohort, prior, curves = learned) => ({
      ...prior,
      curve: curves.get(cohort) ?? curves.get(null) ?? null,
      endResistance: ends.has(cohort) ? { mean: endOf(cohort), sd: ASSUMED.taughtEndSd } : null,
    }),
  };
}

function learnChemistry(histories: readonly FinishedHistory[]): PriorFor {
  const raw = learnRaw(prepared(histories));
  const { told, finished, lifeOf, withLesson } = raw;
  const calibration = judge(raw);
  const known = new Map<string, FleetPrior>();
  const cohortOf = (cohort: string, life: CohortLife): FleetPrior => {
    const prior = known.get(cohort) ?? {
      ...withLesson(cohort, cohortPrior(life)),
      calibration,
    };
    known.set(cohort, prior);
    return prior;
  };
  // worked out now, so that no history is held on to
  const packs = told.map(({ history }, i) => {
    const life = lifeOf(history.cohort);
    if (!life || history.ranOut) return finished[i]!;
    return promised(history, finished[i]!, cohortOf(history.cohort, life));
  });
  const since = new Map(told.map(({ history }) => [history.packKey, history.pack.installedAt]));
  const ofDevice = groupBy(packs, (pack) => `${pack.deviceKey} ${pack.cohort}`);
  return ({ deviceKey, cohort, changedAt = null }) => {
    const life = lifeOf(cohort);
    if (!life) return null;
    const own = ofDevice
      .get(`${deviceKey} ${cohort}`)
      ?.filter(({ packKey }) => changedAt === null || since.get(packKey)! >= changedAt);
    const base = cohortOf(cohort, life);
    if (own && own.length > 0) return { ...base, ...devicePrior(life, own) };
    return changedAt === null ? base : opened(base);
  };
}

/** A changed device draws as such devices do, give or take what a change may do. */
function opened(prior: FleetPrior): FleetPrior {
  const { mean, relativeSd } = prior.drawFactor;
  return {
    ...prior,
    drawFactor: { mean, relativeSd: Math.hypot(relativeSd, ASSUMED.changedDrawSd) },
  };
}

/** Mean life, years, and mean variance of the end of a cohort's packs that ran out. */
function meansOf(finished: readonly FinishedPack[], told: readonly Told[], cohort: string) {
  let days = 0;
  let variance = 0;
  let packs = 0;
  told.forEach(({ history }, i) => {
    if (history.cohort !== cohort || !history.ranOut) return;
    days += history.outAt - history.pack.installedAt;
    variance += (finished[i]!.endSd ?? 0) ** 2;
    packs++;
  });
  return { years: days / packs / DAYS_PER_YEAR, endVariance: variance / packs };
}

/**
 * Forecasts of packs that ran out, held against their ends. Each half is judged with the curve
 * that the other half taught: none on its own readings.
 */
function judge({ told, lifeOf, endOf, withLesson }: Raw): Calibration | null {
  const halves = [0, 1].map((half) =>
    learnCurves(
      told.filter((_, i) => i % 2 !== half),
      endOf,
    ),
  );
  const scores = told.flatMap(({ history }, i) => {
    const life = lifeOf(history.cohort);
    if (!life || !history.ranOut || i < told.length - MOST_JUDGED) return [];
    const prior = withLesson(history.cohort, cohortPrior(life), halves[i % 2]);
    return [endScores({ ...history, prior })];
  });
  const days = told.reduce((s, { history }) => s + history.outAt - history.pack.installedAt, 0);
  return scores.length > 0 ? calibrate(scores, days / told.length / DAYS_PER_YEAR) : null;
}

/** Its life beside the sheet's; of one swapped early at least what it had lived. */
function finishedPack({ history, spent: one }: Told, endFactor: number): FinishedPack {
  const { packKey, deviceKey, cohort, lot, ranOut } = history;
  if (!ranOut) {
    const pace = paceTo(one, endUnder(one, endFactor), history.outAt);
    return { packKey, deviceKey, cohort, lot, lifeRatio: lifeRatio(pace), ranOut };
  }
  const { lnPace, sd } = paceTold(one, endFactor);
  return {
    packKey,
    deviceKey,
    cohort,
    lot,
    lifeRatio: lifeRatio(Math.exp(lnPace)),
    ranOut,
    endSd: sd,
  };
}

/** Life relative to a pack of the assumed capacity and the sheet's draw. */
const lifeRatio = (pace: number): number => 1 / (pace * ASSUMED.capacityMean);

/** A swapped pack with the life that its readings promised. */
function promised(history: FinishedHistory, pack: FinishedPack, prior: FleetPrior): FinishedPack {
  const { lnPace, sd } = expectedLife({
    pack: history.pack,
    readings: history.readings.filter((r) => r.at <= history.outAt),
    events: [{ kind: "reporting", at: history.outAt }],
    prior,
    now: history.outAt,
    ...(history.temperatures ? { temperatures: history.temperatures } : {}),
  });
  return { ...pack, expected: { lnRatio: -lnPace - Math.log(ASSUMED.capacityMean), sd } };
}
