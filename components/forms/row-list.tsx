"use client";

import { type ReactNode, useState } from "react";
import { Button } from "@/components/ui/button";

export interface RowListProps {
  legend: string;
  /** How many rows there are at first. */
  count: number;
  add: string;
  /** What one row is called: "state", "point". */
  noun: string;
  children: (row: number) => ReactNode;
}

/** Rows of a form that can be added and taken off; names carry the row's number. */
export function RowList({ legend, count, add, noun, children }: RowListProps) {
  const [rows, setRows] = useState(() => Array.from({ length: count }, (_, n) => n));
  const next = (rows.at(-1) ?? -1) + 1;
  return (
    <fieldset className="flex flex-col gap-2">
      <legend className="caps mb-1.5">{legend}</legend>
      {rows.map((row) => (
        <div key={row} className="flex flex-wrap items-start gap-x-3 gap-y-2">
          {children(row)}
          <Button
            kind="quiet"
            className="mt-6"
            aria-label={`Take off ${noun} ${row + 1}`}
            onClick={() => setRows(rows.filter((other) => other !== row))}
          >
            Take off
          </Button>
        </div>
      ))}
      <div>
        <Button onClick={() => setRows([...rows, next])}>{add}</Button>
      </div>
    </fieldset>
  );
}
