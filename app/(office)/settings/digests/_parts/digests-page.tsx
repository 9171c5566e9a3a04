import { type Column, DataTable } from "@/components/ui/data-table";
import { PageHead } from "@/components/ui/page-head";
import { formatDay } from "@/lib/present/format-day";
import { NOTHING } from "@/lib/present/locale";
import { roleNames } from "@/lib/present/role-names";
import { weekdayList } from "@/lib/present/weekday-names";
import type { DigestRow } from "@/lib/usecases/list-digest-choices";
import { DigestDialog } from "./digest-dialog";

export interface DigestsPageProps {
  organisation: { locale: string; timeZone: string };
  rows: readonly DigestRow[];
}

/** Who gets the mail about what is due soon, when, and how far it looks. */
export function DigestsPage({ organisation, rows }: DigestsPageProps) {
  return (
    <>
      <PageHead
        title="Digests"
        lede={`A mail about what is out and what is due soon. Hours are those of ${organisation.timeZone}.`}
      />
      <DataTable
        caption="Digests"
        rows={rows}
        rowKey={(row) => row.personId}
        columns={columns(organisation.locale)}
      />
    </>
  );
}

function columns(locale: string): Column<DigestRow>[] {
  return [
    { key: "name", head: "Person", rowHeader: true, cell: (row) => row.name },
    { key: "roles", head: "Roles", cell: (row) => roleNames(row.roles) },
    {
      ...{ key: "when", head: "Sent" },
      cell: (row) =>
        row.weekdays && row.sendAt ? (
          `${weekdayList(row.weekdays, locale)}, ${row.sendAt.slice(0, 5)}`
        ) : (
          <span className="text-soft">no digest</span>
        ),
    },
    {
      ...{ key: "horizon", head: "Looks ahead", align: "right" },
      cell: (row) => (row.horizonDays === null ? NOTHING : `${row.horizonDays} days`),
    },
    {
      ...{ key: "last", head: "Last sent" },
      cell: (row) =>
        row.lastSentOn ? formatDay(row.lastSentOn, locale, { weekday: true, year: true }) : NOTHING,
    },
    {
      ...{ key: "acts", head: <span className="sr-only">Acts</span>, align: "right" },
      cell: (row) => <DigestDialog row={row} locale={locale} />,
    },
  ];
}
