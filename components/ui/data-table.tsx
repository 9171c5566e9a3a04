import Link from "next/link";
import type { ReactNode } from "react";

export interface Column<Row> {
  key: string;
  head: ReactNode;
  cell: (row: Row) => ReactNode;
  align?: "left" | "right";
  /** Makes the head a link; the name of the order in the address. */
  sortKey?: string;
  /** "flush" takes the cell's padding away, for strips and bars that meet the rules. */
  fit?: "flush";
  /** Dropped below 1280 px, where the table would not hold. */
  wideOnly?: boolean;
  /** The cell that names the row. */
  rowHeader?: boolean;
}

export interface SortState {
  key: string;
  direction: "ascending" | "descending";
  hrefFor: (key: string, direction: "ascending" | "descending") => string;
}

export interface DataTableProps<Row> {
  /** What the table lists; read out, and shown when `showCaption`. */
  caption: string;
  showCaption?: boolean;
  columns: readonly Column<Row>[];
  rows: readonly Row[];
  rowKey: (row: Row) => string;
  sort?: SortState;
  selectedKey?: string;
  /** Shown in place of rows: say what to do next. */
  empty?: ReactNode;
}

/** What every row and cell shares stands once on their parent: tables of hundreds of rows travel. */
const BODY = [
  "[&>tr]:border-t [&>tr]:border-hair [&>tr:first-child]:border-t-0 [&>tr:hover]:bg-picked",
  "[&>tr[aria-current=true]]:bg-picked",
  "[&>tr>*]:h-9.5 [&>tr>*]:px-2.5 [&>tr>*]:text-left [&>tr>*]:font-normal [&>tr>*]:whitespace-nowrap",
].join(" ");

/** A dense ruled table, rendered on the server; sorting is by links, so it works without script. */
export function DataTable<Row>(props: DataTableProps<Row>) {
  const { caption, columns, rows, sort, showCaption } = props;
  return (
    <div
      role="region"
      aria-label={caption}
      tabIndex={0}
      className="relative overflow-x-auto border border-rule bg-sheet"
    >
      <table className="w-full border-collapse">
        <caption className={showCaption ? "caps px-2.5 py-2 text-left" : "sr-only"}>
          {caption}
        </caption>
        <thead>
          <tr className="border-b border-ink">
            {columns.map((column) => (
              <Head key={column.key} column={column} sort={sort} />
            ))}
          </tr>
        </thead>
        <tbody className={BODY}>
          {rows.map((row) => (
            <Row key={props.rowKey(row)} row={row} {...props} />
          ))}
          {rows.length === 0 && (
            <tr>
              <td colSpan={columns.length} className="h-auto! px-4 py-8 whitespace-normal!">
                {props.empty ?? "Nothing to show."}
              </td>
            </tr>
          )}
        </tbody>
      </table>
    </div>
  );
}

function headClass<Row>(column: Column<Row>): string {
  const place = column.fit === "flush" ? "p-0" : "px-2.5 py-1.5";
  const align = column.align === "right" ? "text-right" : "text-left";
  return `${place} ${align} ${column.wideOnly ? "max-xl:hidden" : ""}`;
}

/** Only what differs from `BODY`. */
function cellClass<Row>(column: Column<Row>): string | undefined {
  const classes = [
    column.fit === "flush" && "p-0!",
    column.align === "right" && "text-right!",
    column.wideOnly && "max-xl:hidden",
  ].filter(Boolean);
  return classes.length > 0 ? classes.join(" ") : undefined;
}

function Head<Row>({ column, sort }: { column: Column<Row>; sort: SortState | undefined }) {
  const current = sort !== undefined && sort.key === column.sortKey ? sort.direction : undefined;
  return (
    <th scope="col" aria-sort={current} className={`caps align-bottom ${headClass(column)}`}>
      {sort && column.sortKey ? (
        <Link
          prefetch={false}
          scroll={false}
          href={sort.hrefFor(column.sortKey, current === "ascending" ? "descending" : "ascending")}
          className={`inline-flex min-h-6 items-end gap-1 hover:text-ink hover:underline ${current ? "text-ink" : ""}`}
        >
          {column.head}
          <span aria-hidden="true">
            {{ ascending: "↑", descending: "↓", none: "" }[current ?? "none"]}
          </span>
        </Link>
      ) : (
        column.head
      )}
    </th>
  );
}

function Row<R>({ row, columns, rowKey, selectedKey }: DataTableProps<R> & { row: R }) {
  const selected = selectedKey !== undefined && selectedKey === rowKey(row);
  return (
    <tr {...(selected && { "aria-current": "true" as const })}>
      {columns.map((column) => {
        const Cell = column.rowHeader ? "th" : "td";
        return (
          <Cell
            key={column.key}
            {...(column.rowHeader && { scope: "row" })}
            className={cellClass(column)}
          >
            {column.cell(row)}
          </Cell>
        );
      })}
    </tr>
  );
}
