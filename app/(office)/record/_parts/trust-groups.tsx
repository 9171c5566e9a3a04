import { type Column, DataTable } from "@/components/ui/data-table";
import { Section } from "@/components/ui/page-head";
import { EmptyState } from "@/components/ui/states";
import { CHEMISTRY_WORDS } from "@/lib/present/chemistry-words";
import { formatPercent } from "@/lib/present/format-share";
import { formatNumber, NOTHING } from "@/lib/present/locale";
import type { TrustView } from "@/lib/usecases/read-trust";
import { timesSaid } from "./trust-figures";

type GroupRow = TrustView["groups"][number];

export function TrustGroups({ view }: { view: TrustView }) {
  return (
    <Section title={`By ${view.input.group}`}>
      <DataTable
        caption={`Forecasts on record by ${view.input.group}`}
        columns={columns(view.organisation.locale)}
        rows={view.groups}
        rowKey={(row) => row.name}
        empty={
          <EmptyState title="No forecast is on record in this time.">
            Widen the time, or import past installs and voltages: the next night works out what
            would have been said at the start of each quarter, from what was known then.
          </EmptyState>
        }
      />
      <p className="max-w-prose px-3 py-2.5 text-soft">
        Every pack in service counts, not only those that came out: one that stops always comes out,
        one that runs on does not. The range allows for chance between packs, not for a cold winter
        that meets all of them at once.
        {view.inHindsight > 0 && ` ${hindsightWords(view)}`}
      </p>
    </Section>
  );
}

function hindsightWords({ inHindsight, organisation }: TrustView): string {
  const share = formatPercent(inHindsight, organisation.locale);
  return `Worked out afterwards, from what was known on the day and nothing later: ${share} of these forecasts.`;
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
    { key: "packs", head: "Packs", align: "right", cell: (row) => number(row.packs) },
    { key: "stopped", head: "Stopped", align: "right", cell: (row) => number(row.stopped) },
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
      key: "lasted",
      head: "Days found over said",
      align: "right",
      cell: (row) => (row.lasted === null ? NOTHING : timesSaid(row.lasted, locale)),
    },
    { key: "surprises", head: "Surprises", align: "right", cell: (row) => number(row.surprises) },
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
