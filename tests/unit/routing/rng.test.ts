import { describe, expect, it } from "vitest";
import { seededRng, xorshift32 } from "../../../lib/routing/rng";

describe("seeded chance", () => {
  /** Truth: the first numbers of Marsaglia's example seed 2463534242 (2003, from memory). */
  it("is Marsaglia's xorshift 13-17-5", () => {
    const first = xorshift32(2463534242);
    expect([first, xorshift32(first)]).toEqual([723471715, 2497366906]);
  });

  /** Truth: mean 1/2 and variance 1/12 of the uniform distribution; five standard errors. */
  it("is uniform, also from neighbouring small seeds", () => {
    const draws = Array.from({ length: 20_000 }, (_, seed) => seededRng(seed).unit());
    const mean = draws.reduce((sum, u) => sum + u, 0) / draws.length;
    const spread = draws.reduce((sum, u) => sum + (u - mean) ** 2, 0) / draws.length;
    expect(Math.abs(mean - 0.5)).toBeLessThan(5 * Math.sqrt(1 / 12 / draws.length));
    expect(Math.abs(spread - 1 / 12)).toBeLessThan(5 * Math.sqrt(1 / 180 / draws.length));
  });
});
