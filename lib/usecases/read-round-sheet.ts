import { z } from "zod";
import { getOrganisation } from "@/db/queries/organisation";
import { findRound } from "@/db/queries/plan-rounds";
import {
  listCellTypeNames,
  loadLotsOnHand,
  loadTechniciansToPlan,
} from "@/db/queries/planning-fleet";
import { loadRoundSheets } from "@/db/queries/round-sheets";
import { forbidden, notFound } from "@/lib/errors";
import type { Ticket } from "@/lib/planning/fleet";
import { loadCells, loadGear } from "@/lib/planning/load-list";
import { localDay } from "@/lib/planning/local-time";
import { boardRound } from "@/lib/present/rounds-board";
import { shiftS } from "./rounds-of-week";
import { accessWords } from "./round-mail";
import { defineUseCase, ROLES } from "./use-case";

/** One round as a sheet: load list by lot, stops with the way in, hazards and tasks. */
export const readRoundSheet = defineUseCase({
  name: "read-round-sheet",
  allow: { roles: ROLES },
  input: z.object({ roundId: z.uuid() }),
  async run(deps, actor, { roundId }) {
    const round = await findRound(deps.db, roundId);
    if (!round) throw notFound("This round");
    const own = actor.kind === "person" && actor.technicianId === round.technicianId;
    const office = actor.kind === "person" && actor.roles.some((role) => role !== "technician");
    if (!own && !office) throw forbidden("This round is somebody else's.");
    const [organisation, technicians, stops, lots, names] = await Promise.all([
      getOrganisation(deps.db),
      loadTechniciansToPlan(deps.db, []),
      loadRoundSheets(deps.db, [roundId]),
      loadLotsOnHand(deps.db),
      listCellTypeNames(deps.db),
    ]);
    const technician = technicians.find((t) => t.id === round.technicianId);
    const board = boardRound(
      {
        ...round,
        roundId,
        technicianName: technician?.name ?? "",
        shiftS: shiftS(technician, round.day),
        depot: { latitude: technician?.latitude ?? 0, longitude: technician?.longitude ?? 0 },
        stops,
      },
      localDay(deps.now(), organisation.timeZone),
      organisation,
    );
    const swaps = stops.flatMap((stop) =>
      stop.tasks.filter((task) => task.kind === "swap" && task.cellTypeId !== null),
    );
    const cells = loadCells(
      swaps.map(({ assetId, tag, cellTypeId, cells: count }) => ({
        assetId,
        tag,
        cellTypeId: cellTypeId ?? "",
        cells: count,
      })),
      lots,
    );
    const typeName = (id: string) => names.get(id) ?? "";
    return {
      organisation: organisation.name,
      round: board,
      technician: technician?.name ?? "",
      depot: technician?.depotName ?? "",
      van: technician?.vanName ?? null,
      load: cells.lines.map((line) => ({ ...line, designation: typeName(line.cellTypeId) })),
      shortages: cells.shortages.map((s) => ({ ...s, designation: typeName(s.cellTypeId) })),
      gear: loadGear(stops.map((stop) => ({ ...stop, tickets: stop.tickets as Ticket[] }))),
      lithium: swaps.some((task) => task.chemistry?.startsWith("li-")),
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
