import type { Insertable } from "kysely";
import type { Database } from "@/db/client";
import { isoDay } from "../simulate/scenario/local-time";
import type { Scenario } from "../simulate/scenario/scenario";
import { rowId } from "./row-id";

type Rows<Table extends keyof Database> = Insertable<Database[Table]>[];

export function placeRows(s: Scenario): Rows<"stockPlace"> {
  const stores = s.district.depots.flatMap((d) => [
    {
      id: rowId("place", `stores/${d.bank}`),
      kind: "stores",
      name: `${d.name} stores`,
      depotId: rowId("depot", d.bank),
      vanId: null,
    },
    {
      id: rowId("place", `returns/${d.bank}`),
      kind: "return_box",
      name: `${d.name} return box`,
      depotId: rowId("depot", d.bank),
      vanId: null,
    },
  ]);
  const vans = s.technicians.map((t) => ({
    id: rowId("place", t.vanKey),
    kind: "van",
    name: t.vanName,
    depotId: null,
    vanId: rowId("van", t.vanKey),
  }));
  return [...stores, ...vans];
}

export function lotRows(s: Scenario): Rows<"lot"> {
  return s.lots.map((lot) => ({
    id: rowId("lot", lot.code),
    code: lot.code,
    cellTypeId: rowId("cell-type", lot.designation),
    madeOn: isoDay(lot.madeDay),
    receivedOn: isoDay(lot.receivedDay),
    supplierReference: lot.supplierReference,
    cellsReceived: lot.cellsReceived,
    unitCostMinor: lot.unitCostMinor,
  }));
}

export function lotStockRows(s: Scenario): Rows<"lotStock"> {
  return s.stockCounts.map((c) => ({
    lotId: rowId("lot", c.lotCode),
    placeId: rowId("place", c.place),
    cells: c.cells,
  }));
}

export function moveRows(s: Scenario): Rows<"stockMove"> {
  return s.stockMoves.map((m, i) => ({
    id: rowId("move", String(i)),
    lotId: rowId("lot", m.lotCode),
    fromPlaceId: m.from && rowId("place", m.from),
    toPlaceId: m.to && rowId("place", m.to),
    cells: m.cells,
    at: m.at,
    reason: m.reason,
    personId: m.technicianKey && rowId("person", m.technicianKey),
  }));
}
