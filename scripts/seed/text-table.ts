/** A table of text: the head, then the rows. */
export type TextTable = readonly (readonly string[])[];

/** An integer of a finer unit as a decimal number: 3482 mV with 3 digits is 3.482. */
export function decimals(value: number, digits: number): string {
  return String(value / 10 ** digits);
}

export function money(minor: number | null): string {
  return minor === null ? "" : (minor / 100).toFixed(2);
}
