import type { ReactNode } from "react";
import { type Column, DataTable } from "@/components/ui/data-table";
import { EmptyState } from "@/components/ui/states";
import {
  cellCaution,
  coldWords,
  holderWords,
  lifeWords,
  massWords,
} from "@/lib/present/cell-choice-words";
import { CHEMISTRY_WORDS } from "@/lib/present/chemistry-words";
import { formatMoney } from "@/lib/present/format-quantity";
import { EN_DASH } from "@/lib/present/locale";
import type { CellComparison } from "@/lib/usecases/compare-cells";

type Option = CellComparison["choice"]["fitting"][number];

/** Cells that fit, the cheapest year first. */
export function CellChoiceTable({ view }: { view: CellComparison }) {
  return (
    <div className="mb-5">
      <DataTable
        caption="Cells that fit, cheapest year first"
        showCaption
        columns={columns(view)}
        rows={view.choice.fitting}
        rowKey={(row) => row.cell.id}
        empty={
          <EmptyState title="No cell type in Stores fits this device.">
            Check its cut-off, its series count and its duty cycle, or add a cell type in Stores.
          </EmptyState>
        }
      />
    </div>
  );
}

function Wrapped({ children, wide }: { children: ReactNode; wide?: boolean }) {
  const width = wide ? "w-56" : "w-36";
  return <span className={`block py-1.5 whitespace-normal ${width}`}>{children}</span>;
}

function columns({ organisation, choice, subject }: CellComparison): Column<Option>[] {
  const { locale } = organisation;
  const money = (minor: number) => formatMoney(Math.round(minor), organisation);
  return [
    {
      key: "cell",
      head: "Cell",
      rowHeader: true,
      cell: ({ cell }) => (
        <>
          <b>{cell.designation}</b>{" "}
          <span className="text-soft">
            {CHEMISTRY_WORDS[cell.spec.chemistry]}
            {cell.size && `, ${cell.size}`}
            {cell.id === subject.installed && ", in now"}
          </span>
        </>
      ),
    },
    {
      key: "life",
      head: "Life of a pack",
      cell: (row) => <LifeCell row={row} locale={locale} />,
    },
    {
      key: "cost",
      head: (
        <>
          Cost a year,
          <br />
          visits included
        </>
      ),
      align: "right",
      cell: ({ costPerYear: c }) => (
        <>
          <b>{money(c.likely)}</b>{" "}
          <span className="text-soft">
            {money(c.low)}
            {EN_DASH}
            {money(c.high)}
          </span>
        </>
      ),
    },
    {
      key: "pack",
      head: "Cells of a pack",
      align: "right",
      cell: ({ cellsMinor }) => formatMoney(cellsMinor, organisation),
    },
    { key: "mass", head: "Mass", align: "right", cell: (row) => massWords(row.massMg, locale) },
    {
      key: "cold",
      head: "In the coldest night",
      cell: (row) => <Wrapped>{coldWords(row, locale)}</Wrapped>,
    },
    {
      key: "holder",
      head: "Holder",
      cell: (row) => <Wrapped>{holderWords(row, choice.fitting)}</Wrapped>,
    },
    {
      key: "caution",
      head: "Mind",
      cell: (row) => <Wrapped wide>{cellCaution(row.cell)}</Wrapped>,
    },
  ];
}

function LifeCell({ row, locale }: { row: Option; locale: string }) {
  const { likely, range } = lifeWords(row, locale);
  return (
    <span className="block py-1.5">
      <b>{likely}</b> <span className="text-soft">{range}</span>
      {row.outlivesShelf && (
        <span className="block text-sm text-honey-ink">longer than its shelf life vouches for</span>
      )}
    </span>
  );
}
