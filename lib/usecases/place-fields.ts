import { scaledEntry } from "./form-entries";

/** Degrees (WGS 84) as people type them, to seven decimals. */
export const degreesEntry = (limit: number, wanted: string) =>
  scaledEntry(7, { min: -limit * 1e7, max: limit * 1e7, wanted }).transform((value) => value / 1e7);
