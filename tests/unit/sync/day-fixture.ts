import type { DayAsset, DayPack, DayStop } from "@/lib/sync/day-pack";
import type { EntryBody } from "@/lib/sync/entries";
import type { OutboxEntry } from "@/lib/sync/outbox";

function asset(n: number): DayAsset {
  return {
    ...{ id: `asset-${n}`, tag: `QF-000${n}`, name: `Gauge ${n}`, siteId: "site", note: "" },
    ...{ modelId: "model", state: "in_service", climate: 0 },
    pack: {
      ...{ id: `pack-${n}`, cellTypeId: "lr20", lotCode: null, series: 2, parallel: 1 },
      ...{ installedDay: 20_500, madeDay: null, measuredDraw: null, forecast: null },
      ...{ readings: [], events: [] },
    },
  };
}

function stop(n: number): DayStop {
  return {
    ...{ id: `stop-${n}`, siteId: "site", position: n, state: "planned" },
    ...{ arrivesAt: "2026-12-01T09:00:00Z", departsAt: "2026-12-01T09:20:00Z" },
    ...{ cannotReason: null, returnOn: null, doneAt: null },
    tasks: [
      {
        ...{ id: `task-${n}`, kind: "swap", assetId: `asset-${n}`, packId: `pack-${n}` },
        ...{ cellTypeId: "lr20", cells: 2, state: "planned" },
      },
    ],
  };
}

/** A day of two stops with one pack of two LR20 each, and ten LR20 of one lot in the van. */
export function dayPack(): DayPack {
  const rated = { currentUa: 50_000, cutoffMv: 800, temperatureDc: 200, capacityMah: 15_000 };
  return {
    ...{ version: 1, madeAt: "2026-12-01T06:00:00Z", person: { id: "me", name: "Jo Fenn" } },
    organisation: {
      ...{ name: "Quillmere Drainage Board", locale: "en-GB", timeZone: "Europe/London" },
      currency: "GBP",
    },
    van: {
      ...{ placeId: "van", name: "Van 1" },
      lots: [{ lotId: "lot", code: "LOT-1", cellTypeId: "lr20", madeOn: "2026-01-01", cells: 10 }],
    },
    rounds: [
      {
        ...{ id: "round", day: "2026-12-01", state: "published", driveS: 0, workS: 0 },
        ...{ startsAt: "2026-12-01T08:00:00Z", endsAt: "2026-12-01T16:00:00Z", distanceM: 61_000 },
        stops: [stop(1), stop(2)],
      },
    ],
    sites: [
      {
        ...{ id: "site", code: "S-1", name: "Sluice 9", latitude: 53.9, longitude: 1.7 },
        ...{ opens: null, closes: null, closures: [], keyCode: "14", contactName: null },
        ...{ contactPhone: null, hazards: [], tickets: [], notes: "" },
      },
    ],
    assets: [asset(1), asset(2)],
    models: [
      {
        ...{ id: "model", name: "Gauge", cutoffMv: 2200, series: 2, parallel: 1 },
        duty: [{ name: "asleep", currentUa: 300, durationMs: 1000 }],
        cellTypeIds: ["lr20"],
      },
    ],
    cellTypes: [
      {
        ...{ id: "lr20", designation: "LR20" },
        spec: {
          ...{ chemistry: "alkaline", nominalMv: 1500, rated, capacityTable: [] },
          ...{ selfDischargePpmPerYear: 20_000, resistanceMohm: 120, maxPulseUa: null },
        },
      },
    ],
    climates: [[45, 47, 68, 92, 124, 153, 174, 173, 148, 112, 74, 50]],
  };
}

const at = { assetId: "asset-1", stopId: "stop-1", note: "" };
export const BODY = {
  reading: {
    ...{ ...at, kind: "reading", packId: "pack-1", millivolts: 2700, mode: "resting" },
    ...{ loadUa: null, temperatureDc: null, instrument: "" },
  },
  swap: {
    ...{ ...at, kind: "swap", oldPackId: "pack-1", newPackId: "new", cellTypeId: "lr20" },
    ...{ lotId: "lot", fromPlaceId: "van", reason: "due", voltageOutMv: 2300, voltageInMv: 3100 },
    ...{ look: "sound", stoppedAt: null, cellsOut: null },
  },
  cannot: { kind: "cannot", stopId: "stop-2", reason: "flooded", returnOn: null, note: "" },
  done: { kind: "stop-done", stopId: "stop-2" },
  finish: { kind: "round", roundId: "round", act: "done" },
} as const satisfies Record<string, EntryBody>;

export function outboxEntry(
  seq: number,
  body: EntryBody,
  happenedAt = "2026-12-01T10:00:00Z",
): OutboxEntry {
  return {
    ...{ seq, id: `entry-${seq}`, personId: "me", happenedAt, body },
    ...{ state: "kept", attempts: 0, refusal: null, appliedAt: null },
  };
}
