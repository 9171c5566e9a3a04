import { DataTable } from "@/components/ui/data-table";
import { PageHead } from "@/components/ui/page-head";
import { EmptyState } from "@/components/ui/states";
import { formatNumber } from "@/lib/present/locale";
import type { ClimateRow } from "@/lib/usecases/list-climates";
import { ConfirmRemoval } from "../../_parts/confirm-removal";
import { removeClimateAction } from "../actions";
import { ClimateDialog } from "./climate-dialog";

export interface ClimatesPageProps {
  organisation: { locale: string };
  rows: readonly ClimateRow[];
  mayChange: boolean;
  newId: string;
}

/** Twelve monthly means a climate, as a table. */
export function ClimatesPage({ organisation, rows, mayChange, newId }: ClimatesPageProps) {
  const months = monthNames(organisation.locale);
  const degrees = (tenths: number) => formatNumber(tenths / 10, organisation.locale, 1);
  return (
    <>
      <PageHead
        title="Climates"
        lede="Monthly mean air temperature in °C. Cold takes usable capacity, heat speeds self-discharge; a site without a climate is reckoned with a temperate lowland year."
        actions={mayChange && <ClimateDialog id={newId} months={months} />}
      />
      <DataTable
        caption="Climates, monthly means in °C"
        rows={rows}
        rowKey={(row) => row.id}
        empty={
          <EmptyState title="No climate yet.">
            Forecasts use a temperate lowland year until sites follow one of yours.
          </EmptyState>
        }
        columns={[
          { key: "name", head: "Climate", rowHeader: true, cell: (row) => row.name },
          ...months.map((month, i) => ({
            ...{ key: month, head: month, align: "right" as const },
            cell: (row: ClimateRow) => degrees(row.monthlyMeanDc[i] ?? 0),
          })),
          { key: "sites", head: "Sites", align: "right", cell: (row) => row.sites },
          {
            ...{ key: "acts", head: <span className="sr-only">Acts</span>, align: "right" },
            cell: (row) =>
              mayChange && (
                <div className="flex justify-end">
                  <ClimateDialog id={row.id} months={months} stored={row} />
                  <ConfirmRemoval
                    id={row.id}
                    called={row.name}
                    loses="Its twelve means are lost. A climate that sites follow is kept."
                    action={removeClimateAction}
                  />
                </div>
              ),
          },
        ]}
      />
    </>
  );
}

function monthNames(locale: string): string[] {
  const format = new Intl.DateTimeFormat(locale, { month: "short", timeZone: "UTC" });
  return Array.from({ length: 12 }, (_, month) => format.format(new Date(Date.UTC(2026, month))));
}
