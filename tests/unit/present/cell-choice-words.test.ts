/** Words of the choice of cells; the sentences by hand. */
import { describe, expect, test } from "vitest";
import { coldWords, lifeWords, massWords, misfitWords } from "@/lib/present/cell-choice-words";

const plain = (text: string) => text.replaceAll("\u00a0", " ");
const life = (p05: number, p50: number, p95: number, beyond = false) => {
  const { likely, range } = lifeWords({ lifeDays: { p05, p50, p95 }, beyond }, "en-GB");
  return [plain(likely), plain(range)];
};

test("a life in months or years, its unit said once", () => {
  expect(life(250, 330, 420)).toEqual(["11 months", "8–14 months"]);
  expect(life(500, 760, 1100)).toEqual(["2.1 years", "16 months – 3.0 years"]);
  expect(life(6000, 7305, 7305, true)).toEqual(["over 20.0 years", "16.4–20.0 years"]);
});

describe("why a cell does not fit", () => {
  test("too high, by how much", () => {
    const words = misfitWords({ kind: "too-high", freshMv: 11_010, limitMv: 5530 }, "en-GB");
    expect(plain(words)).toContain("11.01 V");
    expect(plain(words)).toContain("5.53 V");
  });

  test("a peak above the pulse limit, with the capacitor; none where it would be absurd", () => {
    const pulse = { kind: "pulse" as const, peakUa: 200_000, limitUa: 150_000 };
    expect(plain(misfitWords({ ...pulse, capacitorUf: 10_900 }, "en-GB"))).toMatch(
      /200 mA is above its 150 mA .* 11 mF/,
    );
    expect(misfitWords({ ...pulse, capacitorUf: 5e6 }, "en-GB")).not.toContain("capacitor");
  });

  test("cold, with both temperatures", () => {
    const words = misfitWords({ kind: "cold", coldestDc: -310, limitDc: -200 }, "en-GB");
    expect(plain(words)).toMatch(/−31 °C.*−20 °C/);
  });
});

test("the coldest night in volts and charge", () => {
  const cold = { freshMv: 4400, halfUsedMv: 3200, share: 0.62, stopsHalfUsed: true };
  expect(plain(coldWords({ cold }, "en-GB"))).toBe(
    "4.40 V fresh, 3.20 V half used: stops half used; 62 % of its charge",
  );
});

test("mass of a pack", () => {
  expect([69_000, 6900, 1_240_000].map((mg) => plain(massWords(mg, "en-GB")))).toEqual([
    "69 g",
    "6.9 g",
    "1.2 kg",
  ]);
  expect(massWords(null, "en-GB")).toBe("—");
});
