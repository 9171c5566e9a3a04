import type { Rng } from "../prng";
import { GIVEN_NAMES, FAMILY_NAMES } from "./fen-words";
import { weekdayOf } from "./local-time";
import type { Bank } from "./water";

export type Role = "administrator" | "dispatcher" | "supervisor" | "technician";

export type Ticket = "height" | "boat" | "confined_space" | "roadside" | "explosive_atmosphere";

export interface ScenarioPerson {
  readonly key: string;
  readonly name: string;
  readonly email: string;
  readonly roles: readonly Role[];
}

export interface ScenarioCrew {
  readonly key: string;
  readonly name: string;
  readonly bank: Bank;
}

export interface ScenarioTechnician {
  readonly key: string;
  readonly personKey: string;
  readonly crewKey: string;
  readonly bank: Bank;
  readonly vanKey: string;
  readonly vanName: string;
  readonly tickets: readonly Ticket[];
  /** Minutes past local midnight by weekday 1..7; a missing day is free. */
  readonly shifts: Readonly<Record<number, readonly [number, number]>>;
}

export interface ScenarioAbsence {
  readonly technicianKey: string;
  readonly firstDay: number;
  readonly lastDay: number;
  readonly reason: string;
}

export const CREWS: readonly ScenarioCrew[] = [
  { key: "north", name: "North bank crew", bank: "north" },
  { key: "south", name: "South bank crew", bank: "south" },
];

const EARLY: readonly [number, number] = [7 * 60 + 30, 16 * 60];
const LATE: readonly [number, number] = [8 * 60 + 30, 17 * 60];

function week(
  span: readonly [number, number],
  days: readonly number[],
): ScenarioTechnician["shifts"] {
  return Object.fromEntries(days.map((day) => [day, span]));
}

const CREW_LIST = [
  { bank: "north", tickets: ["height", "boat", "roadside"], span: EARLY, days: [1, 2, 3, 4, 5] },
  { bank: "north", tickets: ["confined_space", "roadside"], span: LATE, days: [1, 2, 3, 4, 5] },
  { bank: "north", tickets: ["roadside"], span: EARLY, days: [1, 2, 4, 5] },
  {
    bank: "south",
    tickets: ["height", "confined_space", "roadside", "explosive_atmosphere"],
    span: EARLY,
    days: [1, 2, 3, 4, 5],
  },
  { bank: "south", tickets: ["boat", "roadside"], span: LATE, days: [1, 2, 3, 4, 5] },
] as const;

export interface Staff {
  readonly people: readonly ScenarioPerson[];
  readonly technicians: readonly ScenarioTechnician[];
}

/**
 * One account for each role, five technicians; the names are ordinary and invented. The first is
 * the one whom the demonstration shows at work: on call where it begins on a weekend.
 */
export function hireStaff(rng: Rng, today: number): Staff {
  const given = rng.shuffle(GIVEN_NAMES);
  const family = rng.shuffle(FAMILY_NAMES);
  const fullName = (): string => `${given.pop() ?? "Anne"} ${family.pop() ?? "Walker"}`;
  const office = (["dispatcher", "supervisor", "administrator"] as const).map((role) => ({
    key: role,
    name: fullName(),
    email: `${role}@quillmere.example`,
    roles: role === "administrator" ? ([role, "dispatcher"] as const) : ([role] as const),
  }));
  const field = CREW_LIST.map((_, i) => ({
    key: `technician-${i + 1}`,
    name: fullName(),
    email: i === 0 ? "technician@quillmere.example" : `technician${i + 1}@quillmere.example`,
    roles: ["technician"] as const,
  }));
  const technicians = CREW_LIST.map((t, i) => ({
    key: `technician-${i + 1}`,
    personKey: `technician-${i + 1}`,
    crewKey: t.bank,
    bank: t.bank,
    vanKey: `van-${i + 1}`,
    vanName: `Van ${i + 1}`,
    tickets: t.tickets,
    shifts: week(t.span, i === 0 ? [...new Set([...t.days, weekdayOf(today)])] : t.days),
  }));
  return { people: [...office, ...field], technicians };
}

const REASONS = ["annual leave", "annual leave", "annual leave", "sick", "training"];

/**
 * Absences over the whole span and six weeks beyond it, without overlap for one technician.
 * The week after `today` always has one, so that the first plan must work around it.
 */
export function planAbsences(
  technicians: readonly ScenarioTechnician[],
  firstDay: number,
  today: number,
  rng: Rng,
): ScenarioAbsence[] {
  const absences: ScenarioAbsence[] = [];
  for (const technician of technicians) {
    let day = firstDay + rng.int(20, 70);
    while (day < today + 42) {
      const length = rng.pick([1, 2, 3, 5, 5, 5, 10]);
      const monday = day - (weekdayOf(day) - 1);
      const start = length >= 5 ? monday : day;
      const lastDay = start + (length === 10 ? 11 : length - 1);
      absences.push({
        technicianKey: technician.key,
        firstDay: start,
        lastDay,
        reason: rng.pick(REASONS),
      });
      day = lastDay + rng.int(35, 95);
    }
  }
  const away = technicians[4] as ScenarioTechnician;
  const monday = today + (8 - weekdayOf(today));
  const clash = absences.some(
    (a) => a.technicianKey === away.key && a.firstDay <= monday + 3 && a.lastDay >= monday + 2,
  );
  if (!clash) {
    absences.push({
      technicianKey: away.key,
      firstDay: monday + 2,
      lastDay: monday + 3,
      reason: "training",
    });
  }
  return absences.filter((a) => a.technicianKey !== technicians[0]?.key || !isNear(a, today));
}

/** The first technician is the one whom the demonstration shows at work: not away these weeks. */
function isNear(absence: ScenarioAbsence, today: number): boolean {
  return absence.lastDay >= today && absence.firstDay <= today + 13;
}

export function isAway(absences: readonly ScenarioAbsence[], key: string, day: number): boolean {
  return absences.some((a) => a.technicianKey === key && a.firstDay <= day && day <= a.lastDay);
}
