import { type Column, DataTable } from "@/components/ui/data-table";
import { Section } from "@/components/ui/page-head";
import { EmptyState } from "@/components/ui/states";
import { CHEMISTRY_WORDS } from "@/lib/present/chemistry-words";
import { formatPercent } from "@/lib/present/format-share";
import { formatNumber, NOTHING } from "@/lib/present/locale";
import type { TrustView } from "@/lib/usecases/read-trust";
import { daysOff } from "./trust-figures";

type GroupRow = TrustView["groups"][number];

export function TrustGroups({ view }: { view: TrustView }) {
  return (
    <Section title={`By ${view.input.group}`}>
      <DataTable
        caption={`Removals by ${view.input.group}`}
        columns={columns(view.organisation.locale)}
        rows={view.groups}
        rowKey={(row) => row.name}
        empty={
          <EmptyState title="No pack has come out in this time.">
            Widen the time, or import past installs: each past swap is judged with what was known
            before it.
          </EmptyState>
        }
      />
    </Section>
  );
}

function columns(locale: string): Column<GroupRow>[] {
  const number = (value: number, decimals = 0) => formatNumber(value, locale, decimals);
  return [
    {
      key: "name",
      head: "Group",
      rowHeader: true,
      cell: (row) => CHEMISTRY_WORDS[row.name] ?? row.name,
    },
    { key: "removals", head: "Came out", align: "right", cell: (row) => number(row.removals) },
    { key: "stopped", head: "Had stopped", align: "right", cell: (row) => number(row.stopped) },
    {
      key: "expected",
      head: "Expected",
      align: "right",
      cell: (row) =>
        `${number(Math.max(0, row.expected - row.spread))}–${number(row.expected + row.spread)}`,
    },
    {
      key: "verdict",
      head: "Verdict",
      cell: (row) => <span className={verdict(row).tone}>{verdict(row).words}</span>,
    },
    {
      key: "off",
      head: "Likely date off by",
      align: "right",
      cell: (row) => (row.daysOff === null ? NOTHING : daysOff(row.daysOff, locale)),
    },
    { key: "surprises", head: "Surprises", align: "right", cell: (row) => number(row.surprises) },
    {
      key: "left",
      head: "Left when alive",
      align: "right",
      cell: (row) => (row.shareLeft === null ? NOTHING : formatPercent(row.shareLeft, locale)),
    },
  ];
}

/** Whether more or fewer had stopped than nine times out of ten should. */
function verdict(row: GroupRow): { words: string; tone: string } {
  if (row.stopped > row.expected + row.spread) {
    return { words: "stops earlier than said", tone: "text-brick-ink" };
  }
  if (row.stopped < row.expected - row.spread) {
    return { words: "lasts longer than said", tone: "text-honey-ink" };
  }
  return { words: "as said", tone: "text-spruce-ink" };
}
