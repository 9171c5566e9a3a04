"use client";

import type { Entries } from "@/components/forms/action-form";
import { controlClass } from "@/components/ui/field";
import type { ImportView } from "@/lib/usecases/read-import";

export interface ColumnTableProps {
  view: ImportView;
  entries: Entries;
}

/** One line a field: which column it is in, in which unit, and what stands there. */
export function ColumnTable({ view, entries }: ColumnTableProps) {
  return (
    <div role="region" aria-label="Columns" tabIndex={0} className="relative overflow-x-auto">
      <table className="w-full max-w-5xl border-collapse">
        <caption className="sr-only">Which column is which</caption>
        <thead>
          <tr className="border-b border-ink text-left">
            {["Field", "Column of the file", "First rows"].map((head) => (
              <th key={head} scope="col" className="caps py-1.5 pr-4">
                {head}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {view.fields.map((field) => (
            <FieldLine key={field.key} field={field} view={view} entries={entries} />
          ))}
        </tbody>
      </table>
    </div>
  );
}

type LineProps = ColumnTableProps & { field: ImportView["fields"][number] };

function FieldLine({ field, view, entries }: LineProps) {
  const match = view.run.settings.columns[field.key];
  const { defaultValue } = entries.text(`column.${field.key}`, match?.column);
  const wrong = entries.fault(field.key);
  const samples = match ? view.samples.map((cells) => cells[match.column] ?? "") : [];
  return (
    <tr className="border-t border-hair first:border-t-0">
      <th scope="row" className="py-1.5 pr-4 text-left font-medium sm:whitespace-nowrap">
        {field.label}
        {field.required && <span className="font-normal text-soft"> needed</span>}
      </th>
      <td className="py-1 pr-4">
        <div className="flex w-44 flex-wrap items-center gap-x-3 gap-y-1 sm:w-72 sm:flex-nowrap">
          <select
            key={defaultValue}
            name={`column.${field.key}`}
            aria-label={`Column with ${field.label}`}
            aria-invalid={wrong ? true : undefined}
            defaultValue={defaultValue}
            className={`${controlClass} max-w-48`}
          >
            <option value="">not in the file</option>
            {view.head.map((name, n) => (
              <option key={n} value={n}>
                {name || `column ${n + 1}`}
              </option>
            ))}
          </select>
          <Unit field={field} entries={entries} unit={match?.unit} />
        </div>
        {wrong && <div className="text-sm font-medium text-brick-ink">{wrong}</div>}
      </td>
      <td className="max-w-96 truncate py-2.5 font-cond text-soft">
        {samples.filter(Boolean).join(" · ")}
      </td>
    </tr>
  );
}

function Unit({
  field,
  entries,
  unit,
}: Omit<LineProps, "view"> & { unit: string | null | undefined }) {
  if (field.units.length <= 1) return <span className="text-soft">{field.units[0]}</span>;
  return (
    <select
      name={`unit.${field.key}`}
      aria-label={`Unit of ${field.label}`}
      defaultValue={entries.text(`unit.${field.key}`, unit).defaultValue}
      className={`${controlClass} max-w-20`}
    >
      {field.units.map((unit) => (
        <option key={unit}>{unit}</option>
      ))}
    </select>
  );
}
