import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  formatPercent,
  formatPercentRange,
  shareLabel,
  shareSentence,
} from "@/lib/present/format-share";

const plain = (text: string) => text.replaceAll("\u00a0", " ");

describe("shares", () => {
  // SI Brochure, 9th ed., 5.4.7: a space stands between the number and the sign %.
  it("rounds to whole percents with a space before the sign, in either locale", () => {
    expect(plain(formatPercent(0.094, "en-GB"))).toBe("9 %");
    expect(plain(formatPercent(0.094, "de-DE"))).toBe("9 %");
    expect(plain(formatPercent(1, "en-GB"))).toBe("100 %");
    expect(plain(formatPercent(0, "en-GB"))).toBe("0 %");
  });
  it("never lets a pack in service read 0 %", () => {
    expect(plain(shareLabel({ share: 0.004, isOut: false }, "en-GB"))).toBe("< 1 %");
    expect(plain(shareLabel({ share: 0, isOut: false }, "en-GB"))).toBe("< 1 %");
    expect(shareLabel({ share: 0.004, isOut: true }, "en-GB")).toBe("out");
    expect(shareLabel({ share: null, isOut: false }, "en-GB")).toBe("not known");
  });
  it("holds for every share and locale", () => {
    const share = fc.double({ min: 0, max: 1, noNaN: true });
    const property = fc.property(share, fc.constantFrom("en-GB", "de-DE"), (value, locale) => {
      const label = plain(shareLabel({ share: value, isOut: false }, locale));
      if (label === "0 %") return false;
      if (label === "100 %") return value === 1;
      const percent = Number(label.replace(/[<>% ]/g, ""));
      return Math.abs(percent - value * 100) <= 1;
    });
    expect(() => fc.assert(property, { numRuns: 500, seed: 7 })).not.toThrow();
  });
  it("refuses what is no share", () => {
    expect(() => formatPercent(9, "en-GB")).toThrow(/0 to 1/);
    expect(() => formatPercent(Number.NaN, "en-GB")).toThrow(/0 to 1/);
  });
  it("reads out as a sentence, and writes ranges with one sign", () => {
    expect(plain(shareSentence({ share: 0.09, isOut: false }, "en-GB"))).toBe("9 % of charge left");
    expect(shareSentence({ share: 0, isOut: true }, "en-GB")).toBe("charge left: out");
    expect(plain(formatPercentRange(0.06, 0.13, "en-GB"))).toBe("6–13 %");
    expect(plain(formatPercentRange(0.001, 0.003, "en-GB"))).toBe("< 1 %");
  });
});
