/**
 * An independent reading of the rules for rounds, on instants and wall clocks through Intl (the
 * planner itself goes through date-fns): it shares no code with lib/planning or lib/routing.
 */
import type { PlanInput } from "@/lib/planning/plan";
import type { PlannedRound } from "@/lib/planning/rounds";

const LOADING_S = 900;
const ALLOWED_OVERTIME_S = 1800;

interface Wall {
  readonly day: string;
  readonly seconds: number;
  readonly weekday: number;
}

export function wallClock(at: Date, timeZone: string): Wall {
  const parts = new Intl.DateTimeFormat("en-GB", {
    timeZone,
    hourCycle: "h23",
    weekday: "short",
    year: "numeric",
    month: "2-digit",
    day: "2-digit",
    hour: "2-digit",
    minute: "2-digit",
    second: "2-digit",
  }).formatToParts(at);
  const part = (type: string) => parts.find((p) => p.type === type)!.value;
  return {
    day: `${part("year")}-${part("month")}-${part("day")}`,
    seconds: Number(part("hour")) * 3600 + Number(part("minute")) * 60 + Number(part("second")),
    weekday: ["Mon", "Tue", "Wed", "Thu", "Fri", "Sat", "Sun"].indexOf(part("weekday")) + 1,
  };
}

function daysApart(from: string, to: string): number {
  return Math.round((Date.parse(to) - Date.parse(from)) / 86_400_000);
}

/** Great circle by the spherical law of cosines: another formula than the planner's. */
function roadSeconds(
  a: { latitude: number; longitude: number },
  b: { latitude: number; longitude: number },
  road: PlanInput["road"],
): number {
  const rad = Math.PI / 180;
  const cos =
    Math.sin(a.latitude * rad) * Math.sin(b.latitude * rad) +
    Math.cos(a.latitude * rad) *
      Math.cos(b.latitude * rad) *
      Math.cos((b.longitude - a.longitude) * rad);
  const metres = 6_371_008.8 * Math.acos(Math.min(1, cos)) * road.detourFactor;
  return (metres / 1000 / road.speedKmh) * 3600;
}

/** Every rule that the rounds break, in words; empty for a sound plan. */
export function faultsOf(input: PlanInput, rounds: readonly PlannedRound[]): string[] {
  const faults: string[] = [];
  const { frame } = input;
  const today = wallClock(frame.now, frame.timeZone).day;
  const seenSlots = new Set<string>();
  const seenSites = new Set<string>();
  const cells = new Map<string, number>();
  for (const round of rounds) {
    const who = input.technicians.find((t) => t.technicianId === round.technicianId);
    if (!who) {
      faults.push(`unknown technician ${round.technicianId}`);
      continue;
    }
    const name = `${who.name} ${round.day}`;
    if (seenSlots.has(name)) faults.push(`${name} twice`);
    seenSlots.add(name);
    const begins = wallClock(round.startsAt, frame.timeZone);
    const shift = who.shifts.find((s) => s.weekday === begins.weekday);
    if (begins.day !== round.day) faults.push(`${name} starts on ${begins.day}`);
    if (round.day < today || round.day < frame.firstDay || round.day > frame.lastDay)
      faults.push(`${name} is outside the plan`);
    if (!shift) {
      faults.push(`${name} is no working day`);
      continue;
    }
    if (begins.seconds < shift.startsS) faults.push(`${name} starts before the shift`);
    const ends = wallClock(round.endsAt, frame.timeZone);
    if (ends.day !== round.day || ends.seconds > shift.endsS + ALLOWED_OVERTIME_S)
      faults.push(`${name} ends too late`);
    if (who.absences.some((a) => a.firstDay <= round.day && round.day <= a.lastDay))
      faults.push(`${name} is away`);
    if (who.takenDays.includes(round.day)) faults.push(`${name} is taken`);
    let at: { latitude: number; longitude: number } = who.depot;
    let free = round.startsAt.getTime() / 1000 + LOADING_S;
    let load = 0;
    for (const stop of round.stops) {
      const site = input.sites.find((s) => s.siteId === stop.siteId)!;
      if (seenSites.has(site.siteId)) faults.push(`${site.name} visited twice`);
      seenSites.add(site.siteId);
      const arrives = stop.arrivesAt.getTime() / 1000;
      const { pause } = shift;
      // Seconds of the wall clock between two instants that fall into the break.
      const idle = (fromS: number, toS: number) => {
        const wall = (s: number) => wallClock(new Date(s * 1000), frame.timeZone).seconds;
        const [a, b] = [
          Math.max(wall(fromS), pause?.startsS ?? 0),
          Math.min(wall(toS), pause?.endsS ?? 0),
        ];
        return pause ? Math.max(0, b - a) : 0;
      };
      if (arrives - free - idle(free, arrives) < roadSeconds(at, site, input.road) - 2)
        faults.push(`${site.name} reached faster than the road allows`);
      const [from, to] = [stop.beginsAt, stop.departsAt].map((t) => wallClock(t, frame.timeZone));
      if (pause && from!.seconds > pause.startsS && from!.seconds < pause.endsS)
        faults.push(`${site.name} begun in the break`);
      const workS = stop.tasks.reduce((sum, task) => {
        const pack = input.packs.find((p) => p.assetId === task.assetId)!;
        if (task.kind === "swap") {
          load += task.cells;
          cells.set(pack.cellTypeId, (cells.get(pack.cellTypeId) ?? 0) + task.cells);
        }
        return sum + (task.kind === "swap" ? pack.swapS : pack.readS);
      }, 0);
      const [beginsS, departsS] = [stop.beginsAt, stop.departsAt].map((t) => t.getTime() / 1000);
      if (departsS! - beginsS! - idle(beginsS!, departsS!) < workS)
        faults.push(`${site.name} has too little time for its work`);
      if (site.hours && (from!.seconds < site.hours.opensS || to!.seconds > site.hours.closesS))
        faults.push(`${site.name} outside its hours`);
      if (daysApart(today, round.day) < site.noticeDays) faults.push(`${site.name} without notice`);
      if (site.tickets.some((t) => !who.tickets.includes(t)))
        faults.push(`${site.name}: no ticket`);
      const monthDay = round.day.slice(5);
      for (const c of site.closures) {
        const inside =
          c.firstMonthDay <= c.lastMonthDay
            ? monthDay >= c.firstMonthDay && monthDay <= c.lastMonthDay
            : monthDay >= c.firstMonthDay || monthDay <= c.lastMonthDay;
        if (inside) faults.push(`${site.name} is closed`);
      }
      free = stop.departsAt.getTime() / 1000;
      at = site;
    }
    if (who.vanCells !== null && load > who.vanCells) faults.push(`${name}: van too full`);
    if (round.endsAt.getTime() / 1000 - free < roadSeconds(at, who.depot, input.road) - 2)
      faults.push(`${name} returns faster than the road allows`);
  }
  for (const [type, count] of cells) {
    if (count > (input.cellsOnHand.get(type) ?? 0)) faults.push(`more ${type} than on hand`);
  }
  return faults;
}
