/** What a form shows must read back as what is stored: the reader of files and forms is the judge. */
import { describe, expect, it } from "vitest";
import { readScaled } from "@/lib/csv/read-scaled";
import { writtenMoney, writtenNumber } from "@/lib/present/written-number";

const LOCALES = [
  ["en-GB", "."],
  ["de-DE", ","],
] as const;

describe.each(LOCALES)("numbers typed in %s", (locale, decimal) => {
  it.each([0, 5, 120, 123_456, 100])("an amount of %d keeps both decimals", (minor) => {
    const text = writtenMoney(minor, locale);
    expect(text.split(decimal)[1]).toHaveLength(2);
    expect(readScaled(text, decimal, 2)).toBe(minor);
  });

  it.each([0, 3480, 22, 100_000])("%d thousandths go without trailing zeros", (value) => {
    const text = writtenNumber(value, 3, locale);
    expect(text).not.toMatch(/[.,]\d*0$/);
    expect(readScaled(text, decimal, 3)).toBe(value);
  });
});
