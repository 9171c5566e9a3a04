import { describe, expect, it } from "vitest";
import {
  formatAh,
  formatCurrent,
  formatDistance,
  formatMoney,
  formatTemperature,
  formatVoltBand,
  formatVolts,
  likelyCount,
} from "@/lib/present/format-quantity";

const plain = (text: string) => text.replaceAll(/[\u00a0\u202f]/g, " ");
const gb = { locale: "en-GB", currency: "GBP" };
const de = { locale: "de-DE", currency: "EUR" };

describe("quantities", () => {
  it("writes volts, charge and current in the locale's hand", () => {
    expect(plain(formatVolts(3480, "en-GB"))).toBe("3.48 V");
    expect(plain(formatVolts(3480, "de-DE"))).toBe("3,48 V");
    expect(plain(formatVoltBand(3580, 3640, "en-GB"))).toBe("3.58–3.64 V");
    expect(plain(formatAh(235, "en-GB"))).toBe("235 mAh");
    expect(plain(formatAh(2800, "en-GB"))).toBe("2.8 Ah");
    expect(plain(formatAh(18_000, "de-DE"))).toBe("18 Ah");
    expect(plain(formatCurrent(42, "en-GB"))).toBe("42 µA");
    expect(plain(formatCurrent(1234, "de-DE"))).toBe("1,23 mA");
    expect(plain(formatCurrent(1_500_000, "en-GB"))).toBe("1.5 A");
  });
  it("writes distances and temperatures", () => {
    expect(plain(formatDistance(850, "en-GB"))).toBe("850 m");
    expect(plain(formatDistance(3440, "en-GB"))).toBe("3.4 km");
    expect(plain(formatDistance(61_200, "en-GB"))).toBe("61 km");
    expect(plain(formatTemperature(-45, "en-GB"))).toBe("−4.5 °C");
    expect(plain(formatTemperature(200, "de-DE"))).toBe("20 °C");
  });
  it("writes a count with its range", () => {
    expect(likelyCount(19, 28, "en-GB")).toBe("likely 19–28");
    expect(likelyCount(2, 2, "en-GB")).toBe("likely 2");
  });
});

describe("formatMoney", () => {
  it("writes either locale's way", () => {
    expect(plain(formatMoney(1240, gb))).toBe("£12.40");
    expect(plain(formatMoney(231_000, gb, { whole: true }))).toBe("£2,310");
    expect(plain(formatMoney(231_000, de, { whole: true }))).toBe("2.310 €");
    expect(plain(formatMoney(18_400, gb, { whole: true, per: "wk" }))).toBe("£184 / wk");
  });
  it("never rounds a small cost to nothing", () => {
    expect(plain(formatMoney(20, gb, { whole: true, per: "wk" }))).toBe("< £1 / wk");
    expect(plain(formatMoney(0, gb, { whole: true }))).toBe("£0");
    expect(plain(formatMoney(60, gb, { whole: true }))).toBe("£1");
  });
  it("knows how many minor units make one (ISO 4217: JPY 0, KWD 3)", () => {
    expect(plain(formatMoney(1234, { locale: "en-GB", currency: "JPY" }))).toMatch(/1,234$/);
    expect(plain(formatMoney(1234, { locale: "en-GB", currency: "KWD" }))).toMatch(/1\.234$/);
  });
});
