/** A unit a column may be in: `digits` is the power of ten to the stored integer. */
export interface ColumnUnit {
  readonly name: string;
  readonly digits: number;
}

export const VOLTAGE: readonly ColumnUnit[] = [
  { name: "V", digits: 3 },
  { name: "mV", digits: 0 },
];
export const CURRENT: readonly ColumnUnit[] = [
  { name: "mA", digits: 3 },
  { name: "µA", digits: 0 },
  { name: "A", digits: 6 },
];
export const CAPACITY: readonly ColumnUnit[] = [
  { name: "Ah", digits: 3 },
  { name: "mAh", digits: 0 },
];
export const RESISTANCE: readonly ColumnUnit[] = [
  { name: "Ω", digits: 3 },
  { name: "mΩ", digits: 0 },
];
export const MASS: readonly ColumnUnit[] = [
  { name: "g", digits: 3 },
  { name: "mg", digits: 0 },
  { name: "kg", digits: 6 },
];
export const TEMPERATURE: readonly ColumnUnit[] = [{ name: "°C", digits: 1 }];
export const MONEY: readonly ColumnUnit[] = [{ name: "", digits: 2 }];
export const WHOLE: readonly ColumnUnit[] = [{ name: "", digits: 0 }];
export const DEGREES: readonly ColumnUnit[] = [{ name: "°", digits: 7 }];

type FieldKind =
  | { readonly type: "text"; readonly longest?: number; readonly pattern?: RegExp }
  | {
      readonly type: "scaled";
      readonly units: readonly ColumnUnit[];
      readonly min: number;
      readonly max: number;
    }
  | { readonly type: "instant" }
  | { readonly type: "day" }
  | { readonly type: "clock" }
  /** Words in files and the stored word each means. */
  | { readonly type: "choice"; readonly words: Readonly<Record<string, string>> }
  | { readonly type: "choices"; readonly words: Readonly<Record<string, string>> };

/** One thing a file may say about a row. */
export type FieldSpec = FieldKind & {
  readonly key: string;
  readonly label: string;
  /** A row without it is refused. */
  readonly required?: boolean;
  /** Other heads that mean it, in plain words; case, spaces and signs do not count. */
  readonly heads: readonly string[];
};

/** Lower case, without signs and accents: how heads and words are compared. */
export function plainWord(text: string): string {
  return text
    .normalize("NFKD")
    .replace(/[\u0300-\u036f]/g, "")
    .replace(/[\u00b5\u03bc]/g, "u")
    .replace(/[\u03a9\u2126]/g, "ohm")
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, "");
}
