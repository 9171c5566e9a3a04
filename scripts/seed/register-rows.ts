import type { Insertable } from "kysely";
import type { Database } from "@/db/client";
import type { RoadRecord } from "@/db/queries/roads";
import { modelByCode } from "../simulate/scenario/device-models";
import { toWgs84 } from "../simulate/scenario/geometry";
import { ROAD_SPEED_KMH } from "../simulate/scenario/roads";
import type { Scenario } from "../simulate/scenario/scenario";
import { clock } from "./people-rows";
import { rowId } from "./row-id";

type Rows<Table extends keyof Database> = Insertable<Database[Table]>[];

const CLIMATE = "Open fen";

export function climateRows(s: Scenario): Rows<"climate"> {
  return [{ id: rowId("climate", CLIMATE), name: CLIMATE, monthlyMeanDc: [...s.monthlyMeanDc] }];
}

export function siteRows(s: Scenario): Rows<"site"> {
  return s.sites.map((site) => ({
    id: rowId("site", site.code),
    code: site.code,
    name: site.name,
    latitude: site.latitude,
    longitude: site.longitude,
    crewId: rowId("crew", site.bank),
    climateId: rowId("climate", CLIMATE),
    noticeDays: site.noticeDays,
    opens: site.hours ? clock(site.hours[0]) : null,
    closes: site.hours ? clock(site.hours[1]) : null,
    keyCode: site.keyCode,
    contactName: site.contact?.name ?? null,
    contactEmail: site.contact?.email ?? null,
    contactPhone: site.contact?.phone ?? null,
    hazards: [...site.hazards],
    tickets: [...site.tickets],
    driveUpNotes: site.driveUpNotes,
  }));
}

export function closureRows(s: Scenario): Rows<"siteClosure"> {
  return s.sites.flatMap((site) =>
    site.closure
      ? [
          {
            id: rowId("closure", site.code),
            siteId: rowId("site", site.code),
            firstMonthDay: site.closure.first,
            lastMonthDay: site.closure.last,
            reason: site.closure.reason,
          },
        ]
      : [],
  );
}

export function cellTypeRows(s: Scenario): Rows<"cellType"> {
  return s.cellTypes.map((c) => ({
    id: rowId("cell-type", c.designation),
    designation: c.designation,
    name: c.name,
    chemistry: c.chemistry,
    size: c.size,
    nominalMv: c.nominalMv,
    ratedCapacityMah: c.rated.capacityMah,
    ratedCurrentUa: c.rated.currentUa,
    ratedCutoffMv: c.rated.cutoffMv,
    ratedTemperatureDc: c.rated.temperatureDc,
    selfDischargePpmPerYear: c.selfDischargePpmPerYear,
    resistanceMohm: c.resistanceMohm,
    maxPulseUa: c.maxPulseUa,
    massMg: c.massMg,
    shelfLifeMonths: c.shelfLifeMonths,
    unitCostMinor: c.unitCostMinor,
    reorderPoint: c.reorderPoint,
    leadTimeDays: c.leadTimeDays,
  }));
}

export function capacityRows(s: Scenario): Rows<"capacityPoint"> {
  return s.cellTypes.flatMap((c) =>
    c.capacityTable.map((point) => ({ cellTypeId: rowId("cell-type", c.designation), ...point })),
  );
}

export function modelRows(s: Scenario): Rows<"deviceModel"> {
  return s.models.map((m) => ({
    id: rowId("model", m.code),
    name: m.name,
    cutoffMv: m.cutoffMv,
    series: m.series,
    parallel: m.parallel,
    swapMinutes: m.swapMinutes,
    readMinutes: m.readMinutes,
    silenceCostMinorPerHour: m.silenceCostMinorPerHour,
    habitIntervalDays: m.habitIntervalDays,
  }));
}

export function dutyRows(s: Scenario): Rows<"dutyState"> {
  return s.models.flatMap((m) =>
    m.duty.map((state, i) => ({
      deviceModelId: rowId("model", m.code),
      position: i + 1,
      ...state,
    })),
  );
}

export function acceptedCellRows(s: Scenario): Rows<"deviceModelCellType"> {
  return s.models.flatMap((m) =>
    m.cellTypes.map((designation, i) => ({
      deviceModelId: rowId("model", m.code),
      cellTypeId: rowId("cell-type", designation),
      preferred: i === 0,
    })),
  );
}

export function assetRows(s: Scenario): Rows<"asset"> {
  return s.assets.map((a) => ({
    id: rowId("asset", a.tag),
    tag: a.tag,
    name: a.name,
    siteId: rowId("site", a.siteCode),
    deviceModelId: rowId("model", modelByCode(a.modelCode).code),
    state: a.state,
    silenceCostMinorPerHour: a.silenceCostMinorPerHour,
    firmware: s.firmwareVersion.get(a.tag) ?? (a.modelCode === "RG1" ? "2.3" : ""),
    note: a.note,
    lastHeardAt: s.lastHeard.get(a.tag) ?? null,
  }));
}

/** The district's road graph: what driving times are worked out on. */
export function roadRecords(s: Scenario): RoadRecord[] {
  return s.district.roads.roads.map((road) => ({
    id: road.id,
    speedKmh: ROAD_SPEED_KMH[road.class],
    line: road.line.map((point) => {
      const { latitude, longitude } = toWgs84(point);
      return [longitude, latitude] as const;
    }),
  }));
}
