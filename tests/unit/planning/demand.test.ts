import { describe, expect, it } from "vitest";
import {
  COVER_DAYS,
  demandBetween,
  enoughUntil,
  type PackDemand,
  proposeOrder,
  replacedBy,
  REVIEW_DAYS,
} from "@/lib/planning/demand";

const NOW = 20_000;

/** A pack that stops at one of these days from now, each as likely, installed long ago. */
function pack(daysAhead: readonly number[], cells = 1, age = 5_000): PackDemand {
  return { life: daysAhead.map((day) => NOW + day), installedAt: NOW - age, cells };
}

/** Chance 1/100 of stopping within 30 days, otherwise in far years. */
const rare = pack([15, ...Array.from({ length: 99 }, () => 9_000)]);

describe("demand for cells", () => {
  it("of many rare events is Poisson: 95 % reorder point for mean 6 is 10 (standard tables)", () => {
    // Poisson with mean 6: cdf(9) = 0.9161, cdf(10) = 0.9574. 600 packs at 1/100 each are
    // slightly narrower; binomial(600, 0.01): cdf(9) = 0.9169, cdf(10) = 0.9580 (by summation).
    const packs = Array.from({ length: 600 }, () => rare);
    expect(enoughUntil(packs, NOW + 30)).toBe(10);
    expect(demandBetween(packs, NOW, NOW + 30).mean).toBeCloseTo(6, 6);
  });

  it("gives a range, not the mean: two packs of 4 cells, each out with 1/2", () => {
    const packs = [pack([10, 90], 4), pack([10, 90], 4)];
    expect(demandBetween(packs, NOW, NOW + 30)).toEqual({ mean: 4, p10: 0, p50: 4, p90: 8 });
  });

  it("counts packs that are out already in the first span only", () => {
    const packs = [pack([-20, -5], 3)];
    expect(demandBetween(packs, null, NOW + 30).mean).toBe(3);
    expect(demandBetween(packs, NOW, NOW + 30).mean).toBe(0);
  });

  it("asks again when the successor stops: a life of 100 days, the first stop in 10", () => {
    const steady = pack([10, 10], 2, 90);
    expect(replacedBy(steady, NOW + 9)).toEqual([1, 0, 0]);
    expect(replacedBy(steady, NOW + 109)).toEqual([0, 1, 0]);
    expect(replacedBy(steady, NOW + 110)).toEqual([0, 0, 1]);
    expect(demandBetween([steady], NOW, NOW + 365).mean).toBe(2);
    expect(demandBetween([steady], null, NOW + 365).mean).toBe(4);
  });

  it("months add up to the year", () => {
    const packs = [pack([5, 40, 75, 200], 4, 400), pack([100, 300], 2), rare];
    const days = Array.from({ length: 12 }, (_, month) => NOW + (month + 1) * 30);
    const months = days.map((to, i) => demandBetween(packs, i === 0 ? null : days[i - 1]!, to));
    const sum = months.reduce((total, month) => total + month.mean, 0);
    expect(sum).toBeCloseTo(demandBetween(packs, null, days.at(-1)!).mean, 9);
  });
});

describe("orders", () => {
  const certain = [pack([10.5, 10.5], 2), pack([50.5, 50.5], 2), pack([100.5, 100.5], 2)];
  const supply = { inStock: 2, leadTimeDays: 14, shelfLifeMonths: null };

  it("runs short on the day of the first pack that stock does not reach", () => {
    const order = proposeOrder(certain, supply, NOW, 365);
    expect(order.shortFrom).toBe(NOW + 50);
    expect(order.orderBy).toBe(NOW + 36);
    expect(order.orderNow).toBe(0);
    // Placed on day 36, it arrives on day 50 and covers a review and a quarter: all three packs.
    expect(36 + 14 + REVIEW_DAYS + COVER_DAYS).toBeGreaterThan(100);
    expect(order.orderSize).toBe(4);
  });

  it("is due now when the delivery would come too late after the next look", () => {
    const order = proposeOrder(certain, { ...supply, leadTimeDays: 45 }, NOW, 365);
    expect(order.orderBy).toBe(NOW + 5);
    expect(order.orderNow).toBe(4);
    expect(order.reorderPoint).toBe(4);
  });

  it("keeps to half the shelf life: two months' life cover 30 days after the delivery", () => {
    const short = { ...supply, leadTimeDays: 45, shelfLifeMonths: 2 };
    expect(proposeOrder(certain, short, NOW, 365).orderNow).toBe(2);
  });

  it("asks for nothing where stock lasts, or nothing is fitted", () => {
    expect(proposeOrder(certain, { ...supply, inStock: 6 }, NOW, 365)).toMatchObject({
      shortFrom: null,
      orderBy: null,
      orderNow: 0,
      orderSize: 0,
    });
    expect(proposeOrder([], { ...supply, inStock: 0 }, NOW, 365).orderSize).toBe(0);
  });
});
