/** Invented fleets for planner tests: small, seeded by what fast-check draws. */
import type {
  PlanningPack,
  PlanningPrices,
  PlanningSite,
  PlanningTechnician,
} from "@/lib/planning/fleet";
import { dayNumber } from "@/lib/planning/local-time";
import type { PlanInput } from "@/lib/planning/plan";

export const PRICES: PlanningPrices = {
  crewMinorPerHour: 3800,
  overtimeMinorPerHour: 5700,
  travelMinorPerKm: 45,
};
export const ROAD = { detourFactor: 1.3, speedKmh: 45 };
export const MONDAY = "2026-12-07";

/** Fifty quantiles, evenly from `from` to `to` days after the day. */
export function evenLife(day: string, from: number, to: number): number[] {
  const start = dayNumber(day);
  return Array.from({ length: 50 }, (_, i) => start + from + ((i + 0.5) / 50) * (to - from));
}

export function site(index: number, more: Partial<PlanningSite> = {}): PlanningSite {
  return {
    siteId: `site-${index}`,
    code: `S${index}`,
    name: `Sluice ${index}`,
    latitude: 52.5 + ((index * 37) % 100) / 500,
    longitude: 0.1 + ((index * 61) % 100) / 400,
    noticeDays: 0,
    hours: null,
    closures: [],
    tickets: [],
    keyCode: null,
    ...more,
  };
}

export function pack(
  index: number,
  siteId: string,
  more: Partial<PlanningPack> = {},
): PlanningPack {
  return {
    packId: `pack-${index}`,
    assetId: `asset-${index}`,
    tag: `QF-${index}`,
    assetName: `Level gauge ${index}`,
    siteId,
    life: evenLife(MONDAY, 3, 60),
    installedAt: dayNumber(MONDAY) - 700,
    shareLeft: 0.1,
    silenceMinorPerHour: 60,
    cellTypeId: "LR20",
    designation: "LR20",
    cells: 4,
    cellsMinor: 900,
    swapS: 900,
    readS: 300,
    habitIntervalDays: 540,
    ...more,
  };
}

export function technician(
  index: number,
  more: Partial<PlanningTechnician> = {},
): PlanningTechnician {
  return {
    technicianId: `technician-${index}`,
    name: ["Ada", "Bram", "Cleo", "Dov", "Esi"][index % 5]!,
    crewId: "north",
    depot: { latitude: 52.58 + index * 0.01, longitude: 0.2 },
    tickets: [],
    shifts: [1, 2, 3, 4, 5].map((weekday) => ({ weekday, startsS: 28_800, endsS: 57_600 })),
    absences: [],
    vanCells: null,
    takenDays: [],
    ...more,
  };
}

export function planInput(more: Partial<PlanInput> = {}): PlanInput {
  return {
    frame: {
      timeZone: "Europe/London",
      now: new Date("2026-12-01T09:00:00Z"),
      firstDay: MONDAY,
      lastDay: "2026-12-11",
      workingDays: [1, 2, 3, 4, 5],
    },
    prices: PRICES,
    road: ROAD,
    technicians: [technician(0), technician(1)],
    sites: [site(0), site(1)],
    packs: [pack(0, "site-0"), pack(1, "site-1")],
    cellsOnHand: new Map([["LR20", 1000]]),
    known: [],
    excludedAssets: new Set(),
    ...more,
  };
}
