import { type Column, DataTable } from "@/components/ui/data-table";
import { Section } from "@/components/ui/page-head";
import { formatPercent } from "@/lib/present/format-share";
import { EN_DASH, formatNumber } from "@/lib/present/locale";
import { CAUSE_WORDS, CAUSES, POLICY_WORDS, pounds } from "@/lib/present/policy-comparison";
import type { PolicyOutcome } from "@/lib/present/policy-record";
import type { PoliciesView } from "@/lib/usecases/read-policies";

/** Every number of the charts. */
export function PolicyTable({ view }: { view: PoliciesView }) {
  const { means } = view.record;
  return (
    <Section title="The numbers" aside="a device-year, mean over the worlds">
      <DataTable
        caption="Policies side by side, a device-year"
        columns={measures(view)}
        rows={means}
        rowKey={(row) => row.policy}
      />
      <DataTable
        caption="Cost of a device-year by cause"
        columns={[nameColumn, ...causes(view)]}
        rows={means}
        rowKey={(row) => row.policy}
      />
    </Section>
  );
}

const nameColumn: Column<PolicyOutcome> = {
  key: "policy",
  head: "Policy",
  rowHeader: true,
  cell: (row) => POLICY_WORDS[row.policy],
};

const right = (
  key: string,
  head: string,
  cell: (row: PolicyOutcome) => string,
): Column<PolicyOutcome> => ({ key, head, align: "right", cell });

function measures(view: PoliciesView): Column<PolicyOutcome>[] {
  const { locale } = view;
  const number = (value: number, digits: number) => formatNumber(value, locale, digits);
  return [
    nameColumn,
    right("cost", "Cost", (row) => pounds(row.pounds, locale)),
    right("range", "Cost, each world", (row) => rangeOf(view, row)),
    right("dead", "Hours without data", (row) => number(row.deadHours, 1)),
    right("visits", "Visits", (row) => number(row.visits, 2)),
    right("km", "Kilometres", (row) => number(row.kilometres, 1)),
    right("wasted", "Charge thrown away", (row) => formatPercent(row.wastedShare, locale)),
    right("swaps", "Swaps", (row) => number(row.swaps, 2)),
    right("stops", "Stops", (row) => number(row.stops, 3)),
    right("urgent", "Urgent trips", (row) => number(row.urgentTrips, 3)),
    right("reads", "Voltages taken", (row) => number(row.reads, 2)),
  ];
}

function causes({ locale }: PoliciesView): Column<PolicyOutcome>[] {
  return CAUSES.map((cause) =>
    right(cause, CAUSE_WORDS[cause], (row) => pounds(row.poundsByCause[cause], locale)),
  );
}

/** "£38.10–£41.20": the cheapest and the dearest of the worlds. */
function rangeOf({ record, locale }: PoliciesView, { policy }: PolicyOutcome): string {
  const costs = record.bySeed.filter((one) => one.policy === policy).map((one) => one.pounds);
  const [low, high] = [Math.min(...costs), Math.max(...costs)];
  return low === high
    ? pounds(low, locale)
    : `${pounds(low, locale)}${EN_DASH}${pounds(high, locale)}`;
}
