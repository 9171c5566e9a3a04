import type { Insertable } from "kysely";
import type { Database } from "@/db/client";
import { judgeReading } from "@/lib/usecases/judge-reading";
import { catalogueCell } from "../simulate/scenario/cell-catalogue";
import { modelByCode } from "../simulate/scenario/device-models";
import type { ScenarioPack, ScenarioReading } from "../simulate/scenario/field-log";
import { isoDay } from "../simulate/scenario/local-time";
import type { Scenario } from "../simulate/scenario/scenario";
import { rowId } from "./row-id";

type Rows<Table extends keyof Database> = Insertable<Database[Table]>[];

const person = (technicianKey: string | null): string | null =>
  technicianKey && rowId("person", technicianKey);

export function packRows(s: Scenario): Rows<"pack"> {
  return s.packs.map((p) => ({
    id: rowId("pack", p.key),
    assetId: rowId("asset", p.assetTag),
    cellTypeId: rowId("cell-type", p.designation),
    lotId: rowId("lot", p.lotCode),
    series: p.series,
    parallel: p.parallel,
    madeOn: isoDay(p.madeDay),
    installedAt: p.installedAt,
    installedBy: person(p.installedBy),
    removedAt: p.removedAt,
    removedBy: person(p.removedBy),
    reasonOut: p.reasonOut,
    voltageOutMv: p.voltageOutMv,
    stoppedAt: p.stoppedAt,
    lookOut: p.lookOut,
  }));
}

/** What a phone would have said of the value: refused, kept with a doubt, or kept. */
function judged(
  reading: ScenarioReading,
  pack: ScenarioPack,
  previousRestingMv: number | null,
): { readonly refused: boolean; readonly doubt: string | null } {
  const cell = catalogueCell(pack.designation);
  const { cutoffMv } = modelByCode(pack.assetTag.split("-")[0] ?? "");
  const { refusal, doubt } = judgeReading(
    {
      chemistry: cell.chemistry,
      nominalMv: cell.nominalMv,
      series: pack.series,
      cutoffMv,
      previousRestingMv,
    },
    reading,
  );
  return { refused: refusal !== null, doubt };
}

/** The voltages the product would have taken in, with its doubts; what it would refuse is left out. */
export function takenIn(s: Scenario): { reading: ScenarioReading; doubt: string | null }[] {
  const packs = new Map(s.packs.map((p) => [p.key, p]));
  const lastResting = new Map<string, number>();
  return s.readings.flatMap((reading) => {
    const pack = packs.get(reading.packKey);
    if (!pack) throw new Error(`seed: ${reading.key} names no pack`);
    const { refused, doubt } = judged(reading, pack, lastResting.get(pack.key) ?? null);
    if (refused) return [];
    if (reading.kind === "resting") lastResting.set(pack.key, reading.millivolts);
    return [{ reading, doubt }];
  });
}

export function readingRows(s: Scenario): Rows<"reading"> {
  return takenIn(s).map(({ reading: r, doubt }) => ({
    id: rowId("reading", r.key),
    packId: rowId("pack", r.packKey),
    at: r.at,
    millivolts: r.millivolts,
    kind: r.kind,
    loadUa: r.loadUa,
    temperatureDc: r.temperatureDc,
    accuracyMv: r.accuracyMv,
    instrument: r.instrument,
    source: "phone",
    personId: person(r.technicianKey),
    doubt,
    note: r.note,
    receivedAt: new Date(Math.min(r.at.getTime() + 7 * 60_000, s.now.getTime())),
  }));
}

export function eventRows(s: Scenario): Rows<"deviceEvent"> {
  return s.events.map((e, i) => ({
    id: rowId("event", String(i)),
    assetId: rowId("asset", e.assetTag),
    at: e.at,
    kind: e.kind,
    lastHeardAt: e.lastHeardAt,
    note: e.note,
    personId: person(e.technicianKey),
  }));
}

export function drawRows(s: Scenario): Rows<"drawMeasurement"> {
  return s.draws.map((d) => ({
    id: rowId("draw", d.assetTag),
    assetId: rowId("asset", d.assetTag),
    at: d.at,
    averageUa: d.averageUa,
    method: "clamp meter over one day",
    personId: rowId("person", "technician-1"),
  }));
}
