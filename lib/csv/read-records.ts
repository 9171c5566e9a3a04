import type { FileFormat } from "./guess-format";
import { type FieldSpec, plainWord } from "./field-spec";
import { type ColumnMatches, unitsOf } from "./match-columns";
import { readDay, readInstant } from "./read-instant";
import { readScaled } from "./read-scaled";
import type { Table } from "./read-table";

export type CellValue = string | number | Date | readonly string[] | null;

/** One row in typed values, under the fields' keys. Fields without a column are undefined. */
export interface ImportRecord {
  readonly row: number;
  readonly values: Readonly<Record<string, CellValue | undefined>>;
}

/** What is wrong with one cell, by row and by the head of its column. */
export interface CellFault {
  readonly row: number;
  readonly column: string;
  readonly message: string;
}

export interface Reading {
  readonly records: readonly ImportRecord[];
  readonly faults: readonly CellFault[];
}

interface Context {
  readonly format: FileFormat;
  readonly timeZone: string;
}

type Outcome = { readonly value: CellValue } | { readonly fault: string };

/** Turns rows into typed records; a row with a fault gives faults and no record. */
export function readRecords(
  table: Table,
  fields: readonly FieldSpec[],
  matches: ColumnMatches,
  context: Context,
): Reading {
  const columns = fields.flatMap((field) => {
    const match = matches[field.key];
    if (!match) return [];
    const digits = unitsOf(field).find((u) => u.name === match.unit)?.digits ?? 0;
    return [{ field, digits, place: match.column, head: table.head[match.column] ?? field.label }];
  });
  const records: ImportRecord[] = [];
  const faults: CellFault[] = [];
  for (const { row, cells } of table.rows) {
    const values: Record<string, CellValue> = {};
    const before = faults.length;
    for (const { field, digits, place, head } of columns) {
      const outcome = readCell(cells[place] ?? "", field, digits, context);
      if ("fault" in outcome) faults.push({ row, column: head, message: outcome.fault });
      else values[field.key] = outcome.value;
    }
    if (faults.length === before) records.push({ row, values });
  }
  return { records, faults };
}

function readCell(raw: string, field: FieldSpec, digits: number, context: Context): Outcome {
  const text = raw.trim();
  if (text === "") {
    return field.required ? { fault: `${field.label} is missing.` } : { value: null };
  }
  switch (field.type) {
    case "text":
      return readText(text, field);
    case "scaled":
      return readNumber(text, field, digits, context.format.decimal);
    case "instant": {
      const { at, trouble } = readInstant(text, context.timeZone, context.format.dayOrder);
      return at ? { value: at } : { fault: `${trouble}.` };
    }
    case "day": {
      const day = readDay(text.split(/[T ]/)[0] ?? "", context.format.dayOrder);
      return day ? { value: day } : { fault: `"${text}" is no day.` };
    }
    case "clock":
      return readClock(text);
    case "choice":
      return readChoice(text, field.words);
    case "choices":
      return readChoices(text, field.words);
  }
}

function readText(text: string, field: Extract<FieldSpec, { type: "text" }>): Outcome {
  const longest = field.longest ?? 2000;
  if (text.length > longest) return { fault: `Longer than ${longest} characters.` };
  if (field.pattern && !field.pattern.test(text)) {
    return { fault: `"${text}" has signs that ${field.label.toLowerCase()} may not have.` };
  }
  // What we wrote behind an apostrophe to keep a spreadsheet from running it comes back plain.
  return { value: /^'+[=+\-@\t\r]/.test(text) ? text.slice(1) : text };
}

function readNumber(
  text: string,
  field: Extract<FieldSpec, { type: "scaled" }>,
  digits: number,
  decimal: "." | ",",
): Outcome {
  const value = readScaled(text, decimal, digits);
  if (value === null) return { fault: `"${text}" is no number with "${decimal}" as decimal sign.` };
  if (value >= field.min && value <= field.max) return { value };
  const plain = (n: number) => String(n / 10 ** digits);
  return { fault: `${text} lies outside ${plain(field.min)} to ${plain(field.max)}.` };
}

function readClock(text: string): Outcome {
  const [, hours = "", minutes = ""] = /^(\d{1,2}):(\d{2})(?::\d{2})?$/.exec(text) ?? [];
  const ok = hours !== "" && Number(hours) < 24 && Number(minutes) < 60;
  return ok
    ? { value: `${hours.padStart(2, "0")}:${minutes}:00` }
    : { fault: `"${text}" is no time as HH:MM.` };
}

function readChoice(text: string, words: Readonly<Record<string, string>>): Outcome {
  const value = words[text] ?? words[plainWord(text)];
  if (value !== undefined) return { value };
  const known = [...new Set(Object.values(words))].join(", ");
  return { fault: `"${text}" is not one of: ${known}.` };
}

function readChoices(text: string, words: Readonly<Record<string, string>>): Outcome {
  const values: string[] = [];
  for (const part of text.split(/[|,;/]/)) {
    if (part.trim() === "") continue;
    const outcome = readChoice(part, words);
    if ("fault" in outcome) return outcome;
    values.push(String(outcome.value));
  }
  return { value: [...new Set(values)].sort() };
}
