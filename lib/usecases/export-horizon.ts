import { formatFor, type OutCell, writeTable } from "@/lib/csv/write-table";
import { OUT_PERMILLE } from "@/lib/present/horizon";
import { horizonInput, type HorizonView, readHorizon } from "./read-horizon";
import { defineUseCase } from "./use-case";

/** More than any fleet this is made for; the file says nothing about what lies beyond. */
const MOST_ROWS = 50_000;

const HEAD = [
  "tag",
  "asset name",
  "site",
  "cell type",
  "series",
  "parallel",
  "installed at",
  "charge left %",
  "out",
  "cut-off 5 %",
  "cut-off likely",
  "cut-off 95 %",
  "waiting costs a week",
  "visit on",
  "visit state",
  "technician",
];

/** What the Horizon shows under the same filters and order, all pages, as CSV. */
export const exportHorizon = defineUseCase({
  name: "export-horizon",
  allow: { roles: ["administrator", "dispatcher", "supervisor"] },
  input: horizonInput,
  async run(deps, actor, input): Promise<{ text: string; today: string }> {
    const view = await readHorizon(deps, actor, { ...input, page: 1, pageSize: MOST_ROWS });
    const { locale } = view.organisation;
    const rows = view.rows.map((row) => cellsOf(row, view.organisation));
    return { text: writeTable(HEAD, rows, formatFor(locale)), today: view.today };
  },
});

function cellsOf(
  row: HorizonView["rows"][number],
  { timeZone, currency, locale }: HorizonView["organisation"],
): OutCell[] {
  const at = (moment: Date | null) => (moment ? { at: moment, timeZone } : null);
  const number = (value: number | null, digits = 0) => (value === null ? null : { value, digits });
  return [
    row.tag,
    row.assetName,
    row.siteName,
    row.designation,
    number(row.series),
    number(row.parallel),
    at(row.installedAt),
    number(row.shareLeftPermille, 1),
    (row.outNowPermille ?? 0) >= OUT_PERMILLE ? "out" : "",
    at(row.p05),
    at(row.p50),
    at(row.p95),
    number(row.waitingCostMinorPerWeek, minorDigits(locale, currency)),
    row.visitDay,
    row.roundState,
    row.technicianName,
  ];
}

/** Decimals of the currency (ISO 4217): two for pounds, none for yen. */
function minorDigits(locale: string, currency: string): number {
  const format = new Intl.NumberFormat(locale, { style: "currency", currency });
  return format.resolvedOptions().maximumFractionDigits ?? 2;
}
