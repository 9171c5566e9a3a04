import { type ColumnUnit, type FieldSpec, plainWord } from "./field-spec";

/** Where a field is found: the column's place from 0, and the unit it is in. */
export interface ColumnMatch {
  readonly column: number;
  /** Name of one of the field's units; null for fields without units. */
  readonly unit: string | null;
}

export type ColumnMatches = Readonly<Record<string, ColumnMatch>>;

/** How a head may name a unit at its end: "voltage_mv", "Load (mA)", "rated ah". */
const UNIT_WORDS: Readonly<Record<string, readonly string[]>> = {
  V: ["v", "volt", "volts"],
  mV: ["mv", "millivolt", "millivolts"],
  mA: ["ma", "milliamp", "milliamps"],
  µA: ["ua", "microamp", "microamps"],
  A: ["a", "amp", "amps"],
  Ah: ["ah"],
  mAh: ["mah"],
  Ω: ["ohm", "ohms"],
  mΩ: ["mohm", "milliohm", "milliohms"],
  g: ["g", "gram", "grams"],
  mg: ["mg"],
  kg: ["kg"],
  "°C": ["c", "degc", "celsius"],
  "°": ["deg", "degrees"],
};

/** Guesses a column for each field by its head; every column serves one field at the most. */
export function guessColumns(head: readonly string[], fields: readonly FieldSpec[]): ColumnMatches {
  const plain = head.map(plainWord);
  const taken = new Set<number>();
  const matches: Record<string, ColumnMatch> = {};
  for (const exact of [true, false]) {
    for (const field of fields) {
      if (matches[field.key]) continue;
      const found = findColumn(field, plain, taken, exact);
      if (!found) continue;
      matches[field.key] = found;
      taken.add(found.column);
    }
  }
  return matches;
}

function findColumn(
  field: FieldSpec,
  plain: readonly string[],
  taken: ReadonlySet<number>,
  exact: boolean,
): ColumnMatch | null {
  const units = unitsOf(field);
  const names = [field.key, field.label, ...field.heads].map(plainWord);
  for (const name of names) {
    for (const [column, word] of plain.entries()) {
      if (taken.has(column) || !word.startsWith(name)) continue;
      const rest = word.slice(name.length);
      if (rest === "") return { column, unit: units[0]?.name ?? null };
      const unit = exact ? units.find((u) => UNIT_WORDS[u.name]?.includes(rest)) : undefined;
      if (unit) return { column, unit: unit.name };
    }
  }
  return null;
}

export function unitsOf(field: FieldSpec): readonly ColumnUnit[] {
  return field.type === "scaled" ? field.units : [];
}
