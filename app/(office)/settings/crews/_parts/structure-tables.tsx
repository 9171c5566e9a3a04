import type { ReactNode } from "react";
import { DataTable } from "@/components/ui/data-table";
import { EmptyState } from "@/components/ui/states";
import { formatNumber, NOTHING } from "@/lib/present/locale";
import { ConfirmRemoval } from "../../_parts/confirm-removal";
import { removeCrewAction, removeDepotAction, removeVanAction } from "../actions";
import type { CrewsPageProps } from "./crews-page-props";
import { CrewDialog, DepotDialog, VanDialog } from "./structure-forms";

function Part(props: { title: string; add: ReactNode; children: ReactNode }) {
  return (
    <section className="mb-6">
      <div className="mb-2 flex items-end justify-between gap-3">
        <h2 className="text-lg">{props.title}</h2>
        {props.add}
      </div>
      {props.children}
    </section>
  );
}

const acts = (children: ReactNode) => <div className="flex justify-end">{children}</div>;
const hidden = <span className="sr-only">Acts</span>;

/** Crews with their depot and how many belong to them. */
export function CrewsTable({ view, mayChange, newId }: CrewsPageProps) {
  const { depots, crews } = view;
  return (
    <Part title="Crews" add={mayChange && <CrewDialog id={newId} depots={depots} />}>
      <DataTable
        caption="Crews"
        rows={crews}
        rowKey={(crew) => crew.id}
        empty={<EmptyState title="No crew yet.">Add a depot first, then a crew.</EmptyState>}
        columns={[
          { key: "name", head: "Crew", rowHeader: true, cell: (crew) => crew.name },
          { key: "depot", head: "Depot", cell: (crew) => crew.depotName },
          { key: "people", head: "People", align: "right", cell: (crew) => crew.technicians },
          { key: "sites", head: "Sites", align: "right", cell: (crew) => crew.sites },
          {
            ...{ key: "acts", head: hidden, align: "right" },
            cell: (crew) =>
              mayChange &&
              acts(
                <>
                  <CrewDialog id={crew.id} depots={depots} stored={crew} />
                  <ConfirmRemoval
                    id={crew.id}
                    called={crew.name}
                    loses="Only the name and its depot are lost. A crew that has people, vans or sites is kept."
                    action={removeCrewAction}
                  />
                </>,
              ),
          },
        ]}
      />
    </Part>
  );
}

/** Vans with who drives them. */
export function VansTable({ view, mayChange, newId }: CrewsPageProps) {
  const { crews, vans, organisation } = view;
  const cells = (count: number | null) =>
    count === null ? "no limit" : `${formatNumber(count, organisation.locale)} cells`;
  return (
    <Part title="Vans" add={mayChange && <VanDialog id={newId} crews={crews} />}>
      <DataTable
        caption="Vans"
        rows={vans}
        rowKey={(van) => van.id}
        empty={
          <EmptyState title="No van yet.">A van is where a round’s cells are counted.</EmptyState>
        }
        columns={[
          { key: "name", head: "Van", rowHeader: true, cell: (van) => van.name },
          { key: "crew", head: "Crew", cell: (van) => van.crewName },
          { key: "driver", head: "Driver", cell: (van) => van.driver ?? NOTHING },
          { key: "holds", head: "Holds", align: "right", cell: (van) => cells(van.cellCapacity) },
          {
            ...{ key: "acts", head: hidden, align: "right" },
            cell: (van) =>
              mayChange &&
              acts(
                <>
                  <VanDialog id={van.id} crews={crews} stored={van} />
                  <ConfirmRemoval
                    id={van.id}
                    called={van.name}
                    loses="Only the van’s name is lost. A van that has held cells is kept."
                    action={removeVanAction}
                  />
                </>,
              ),
          },
        ]}
      />
    </Part>
  );
}

/** Depots with their place. */
export function DepotsTable({ view, mayChange, newId }: CrewsPageProps) {
  const place = (degrees: number) => formatNumber(degrees, view.organisation.locale, 5);
  return (
    <Part title="Depots" add={mayChange && <DepotDialog id={newId} />}>
      <DataTable
        caption="Depots"
        rows={view.depots}
        rowKey={(depot) => depot.id}
        empty={<EmptyState title="No depot yet.">Rounds start and end at a depot.</EmptyState>}
        columns={[
          { key: "name", head: "Depot", rowHeader: true, cell: (depot) => depot.name },
          {
            ...{ key: "place", head: "Latitude, longitude" },
            cell: (depot) => `${place(depot.latitude)}° N, ${place(depot.longitude)}° E`,
          },
          { key: "crews", head: "Crews", align: "right", cell: (depot) => depot.crews },
          {
            ...{ key: "acts", head: hidden, align: "right" },
            cell: (depot) =>
              mayChange &&
              acts(
                <>
                  <DepotDialog id={depot.id} stored={depot} />
                  <ConfirmRemoval
                    id={depot.id}
                    called={depot.name}
                    loses="Its name and place are lost, with its empty stores."
                    action={removeDepotAction}
                  />
                </>,
              ),
          },
        ]}
      />
    </Part>
  );
}
