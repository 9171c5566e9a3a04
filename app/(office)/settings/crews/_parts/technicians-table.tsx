import Link from "next/link";
import { LinkButton } from "@/components/ui/button";
import { type Column, DataTable } from "@/components/ui/data-table";
import { EmptyState } from "@/components/ui/states";
import { formatDay } from "@/lib/present/format-day";
import { formatHours } from "@/lib/present/format-time";
import { NOTHING } from "@/lib/present/locale";
import { ticketNames } from "@/lib/present/ticket-names";
import type { CrewsView } from "@/lib/usecases/list-crews";
import type { CrewsPageProps } from "./crews-page-props";

type Row = CrewsView["technicians"][number];

/** Technicians with crew, van, hours, tickets and the next absence. */
export function TechniciansTable({ view, mayChange }: CrewsPageProps) {
  return (
    <section className="mb-6">
      <div className="mb-2 flex items-end justify-between gap-3">
        <h2 className="text-lg">Technicians</h2>
        {mayChange && view.people.length > 0 && view.crews.length > 0 && (
          <LinkButton href="/settings/technicians/new">
            Add to a crew: {view.people.map((person) => person.name).join(", ")}…
          </LinkButton>
        )}
      </div>
      <DataTable
        caption="Technicians"
        rows={view.technicians}
        rowKey={(row) => row.id}
        columns={columns(view)}
        empty={
          <EmptyState title="No technician in a crew yet.">
            Invite people with the role technician, add a depot and a crew, then put them into it.
          </EmptyState>
        }
      />
    </section>
  );
}

function columns({ organisation, today }: CrewsView): Column<Row>[] {
  const { locale } = organisation;
  const day = (iso: string) => formatDay(iso, locale, { weekday: true, today });
  const absence = ({ absentFrom, absentUntil }: Row) => {
    if (!absentFrom || !absentUntil) return NOTHING;
    return absentFrom === absentUntil
      ? day(absentFrom)
      : `${day(absentFrom)} – ${day(absentUntil)}`;
  };
  return [
    {
      ...{ key: "name", head: "Technician", rowHeader: true },
      cell: (row) => (
        <>
          <Link className="textlink" href={`/settings/technicians/${row.id}`}>
            {row.name}
          </Link>
          {!row.active && <span className="text-brick-ink"> switched off</span>}
        </>
      ),
    },
    { key: "crew", head: "Crew", cell: (row) => row.crewName },
    { key: "van", head: "Van", cell: (row) => row.vanName ?? NOTHING },
    {
      ...{ key: "week", head: "A week", align: "right" },
      cell: (row) => formatHours(row.weeklyS, locale),
    },
    { key: "tickets", head: "Tickets", cell: (row) => ticketNames(row.tickets) || NOTHING },
    { key: "absence", head: "Next absence", cell: absence },
  ];
}
