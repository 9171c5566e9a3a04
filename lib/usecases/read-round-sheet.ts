import { z } from "zod";
import { getOrganisation } from "@/db/queries/organisation";
import { findRound, type StoredRound } from "@/db/queries/plan-rounds";
import {
  listCellTypeNames,
  loadLotsOnHand,
  loadTechniciansToPlan,
} from "@/db/queries/planning-fleet";
import { loadRoundSheets, type SheetStop } from "@/db/queries/round-sheets";
import { forbidden, notFound } from "@/lib/errors";
import type { Ticket } from "@/lib/planning/fleet";
import { loadCells, loadGear, type LotOnHand } from "@/lib/planning/load-list";
import { localDay } from "@/lib/planning/local-time";
import { boardRound } from "@/lib/present/rounds-board";
import { boardInputs } from "./rounds-of-week";
import { accessWords } from "./round-mail";
import { type Actor, defineUseCase, ROLES } from "./use-case";

/** One round as a sheet: load list by lot, stops with the way in, hazards and tasks. */
export const readRoundSheet = defineUseCase({
  name: "read-round-sheet",
  allow: { roles: ROLES },
  input: z.object({ roundId: z.uuid() }),
  async run(deps, actor, { roundId }) {
    const round = await findRound(deps.db, roundId);
    if (!round) throw notFound("This round");
    assertMayRead(actor, round);
    const [organisation, technicians, stops, lots, names] = await Promise.all([
      getOrganisation(deps.db),
      loadTechniciansToPlan(deps.db, []),
      loadRoundSheets(deps.db, [roundId]),
      loadLotsOnHand(deps.db),
      listCellTypeNames(deps.db),
    ]);
    const technician = technicians.find((t) => t.id === round.technicianId);
    const today = localDay(deps.now(), organisation.timeZone);
    const [input] = await boardInputs(deps.db, technicians, [round]);
    const board = boardRound({ ...input!, stops }, today, organisation);
    return {
      organisation: organisation.name,
      round: board,
      depot: technician?.depotName ?? "",
      van: technician?.vanName ?? null,
      ...loadOf(stops, lots, names),
      stops: board.stops.map((stop, i) => ({
        ...stop,
        access: accessWords(stops[i]!),
        hazards: stops[i]!.hazards,
        contact: [stops[i]!.contactName, stops[i]!.contactPhone].filter(Boolean).join(" "),
      })),
    };
  },
});
export type RoundSheet = Awaited<ReturnType<typeof readRoundSheet>>;

/** The office reads every round; a technician their own, once it is published. */
function assertMayRead(actor: Actor, round: StoredRound): void {
  if (actor.kind !== "person") throw forbidden();
  if (actor.roles.some((role) => role !== "technician")) return;
  if (actor.technicianId !== round.technicianId) throw forbidden("This round is somebody else's.");
  if (round.state === "proposed") throw notFound("This round");
}

/** What must be in the van, by lot, and what is short. */
function loadOf(
  stops: readonly SheetStop[],
  lots: readonly LotOnHand[],
  names: ReadonlyMap<string, string>,
) {
  const swaps = stops.flatMap((stop) => stop.tasks.filter((task) => task.kind === "swap"));
  const packs = swaps.map(({ assetId, tag, cellTypeId, cells }) => ({
    ...{ assetId, tag, cells },
    cellTypeId: cellTypeId ?? "",
  }));
  const { lines, shortages } = loadCells(packs, lots);
  const designation = (id: string) => names.get(id) ?? "";
  return {
    load: lines.map((line) => ({ ...line, designation: designation(line.cellTypeId) })),
    shortages: shortages.map((s) => ({ ...s, designation: designation(s.cellTypeId) })),
    gear: loadGear(stops.map((stop) => ({ ...stop, tickets: stop.tickets as Ticket[] }))),
    lithium: swaps.some((task) => task.chemistry?.startsWith("li-") ?? false),
  };
}
