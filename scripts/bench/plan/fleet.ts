/** Invented fleets of any size for the planner's benchmark: same density, same mix, seeded. */
import type { PlanningPack, PlanningSite, PlanningTechnician } from "@/lib/planning/fleet";
import { addDays, dayNumber } from "@/lib/planning/local-time";
import type { PlanInput } from "@/lib/planning/plan";
import type { Rng } from "@/lib/routing/rng";

export const FIRST_DAY = "2026-12-07";
const NOW = new Date("2026-12-01T09:00:00Z");
/** As in the demonstration: about six sites to ten assets, one technician to 830 assets. */
const SITES_PER_ASSET = 0.6;
const ASSETS_PER_TECHNICIAN = 834;
/** A district of 700 sites measures about 30 by 24 km. */
const KM2_PER_SITE = 1.03;
const CENTRE = { latitude: 52.5, longitude: 0.1 };
const KM_PER_DEGREE = { latitude: 111.2, longitude: 67.7 };
const QUANTILES = 50;

function pointIn(rng: Rng, sideKm: number) {
  return {
    latitude: CENTRE.latitude + ((rng.unit() - 0.5) * sideKm) / KM_PER_DEGREE.latitude,
    longitude: CENTRE.longitude + ((rng.unit() - 0.5) * sideKm) / KM_PER_DEGREE.longitude,
  };
}

function siteAt(index: number, rng: Rng, sideKm: number): PlanningSite {
  return {
    siteId: `site-${index}`,
    code: `S${index}`,
    name: `Site ${index}`,
    ...pointIn(rng, sideKm),
    noticeDays: rng.unit() < 0.1 ? 10 : 0,
    hours: rng.unit() < 0.2 ? { opensS: 8 * 3600, closesS: 15 * 3600 } : null,
    closures: [],
    tickets: rng.unit() < 0.06 ? ["height"] : [],
    keyCode: null,
  };
}

/** Quantiles of a day about `ahead` days from now, spread by a tenth of the life. */
export function lifeAround(ahead: number, lifeDays: number): number[] {
  const today = dayNumber("2026-12-01");
  return Array.from({ length: QUANTILES }, (_, i) => {
    const aside = ((i + 0.5) / QUANTILES - 0.5) * 0.2 * lifeDays;
    return today + ahead + aside;
  });
}

/** A pack somewhere in its life: packs of steady fleets are of every age. */
function packAt(index: number, siteId: string, rng: Rng): PlanningPack {
  const lifeDays = 200 + rng.unit() * 1600;
  const age = rng.unit() * lifeDays;
  return {
    packId: `pack-${index}`,
    assetId: `asset-${index}`,
    tag: `A${index}`,
    assetName: `Sensor ${index}`,
    siteId,
    life: lifeAround(lifeDays - age, lifeDays),
    installedAt: dayNumber("2026-12-01") - age,
    shareLeft: 1 - age / lifeDays,
    silenceMinorPerHour: 20 + Math.floor(rng.unit() * 300),
    cellTypeId: ["LR20", "LR6", "ER34615"][index % 3]!,
    designation: "",
    cells: 2 + (index % 3),
    cellsMinor: 900,
    swapS: 900,
    readS: 300,
    habitIntervalDays: null,
  };
}

function technicianAt(index: number, rng: Rng, sideKm: number): PlanningTechnician {
  return {
    technicianId: `technician-${index}`,
    name: `Technician ${index}`,
    crewId: "crew",
    depot: pointIn(rng, sideKm * 0.6),
    tickets: index % 2 === 0 ? ["height"] : [],
    shifts: [1, 2, 3, 4, 5].map((weekday) => ({ weekday, startsS: 28_800, endsS: 57_600 })),
    absences: [],
    vanCells: 200,
    takenDays: [],
  };
}

/** The planner's input for a fleet of so many assets. @param weeks weeks to plan, from one on */
export function fleetInput(assets: number, weeks: number, rng: Rng): PlanInput {
  const siteCount = Math.round(assets * SITES_PER_ASSET);
  const sideKm = Math.sqrt(siteCount * KM2_PER_SITE);
  const sites = Array.from({ length: siteCount }, (_, i) => siteAt(i, rng, sideKm));
  const packs = Array.from({ length: assets }, (_, i) =>
    packAt(i, `site-${i < siteCount ? i : Math.floor(rng.unit() * siteCount)}`, rng),
  );
  const technicians = Array.from(
    { length: Math.max(1, Math.round(assets / ASSETS_PER_TECHNICIAN)) },
    (_, i) => technicianAt(i, rng, sideKm),
  );
  return {
    frame: {
      timeZone: "Europe/London",
      now: NOW,
      firstDay: FIRST_DAY,
      lastDay: addDays(FIRST_DAY, weeks * 7 - 1),
      workingDays: [1, 2, 3, 4, 5],
    },
    prices: { crewMinorPerHour: 3800, overtimeMinorPerHour: 5700, travelMinorPerKm: 45 },
    road: { detourFactor: 1.3, speedKmh: 45 },
    technicians,
    sites,
    packs,
    cellsOnHand: new Map(["LR20", "LR6", "ER34615"].map((type) => [type, 100_000])),
    known: [],
    excludedAssets: new Set(),
  };
}
