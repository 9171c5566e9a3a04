import { readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { describe, expect, it } from "vitest";
import { CELL_MAKES } from "@/scripts/simulate/scenario/cell-catalogue";
import { FEN_CLIMATE } from "@/scripts/simulate/weather";
import { createWorld, type World } from "@/scripts/simulate/world";

const FIRST_DAY = 19_000;

function asset(key: string, averageUa: number) {
  return {
    key,
    averageUa,
    peakUa: averageUa * 50,
    cutoffMv: 2000,
    series: 2,
    parallel: 1,
    seasonalShare: 0.1,
    seasonalPeak: 0,
    exposureC: 0,
  };
}

function world(seed: number, keys: readonly string[] = ["a", "b", "c"], averageUa = 400): World {
  return createWorld(seed, {
    firstDay: FIRST_DAY,
    climate: FEN_CLIMATE,
    makes: CELL_MAKES,
    lots: [
      { key: "good", makeKey: "LR6", madeDay: FIRST_DAY - 60 },
      { key: "bad", makeKey: "LR6", madeDay: FIRST_DAY - 60, capacityFactor: 0.6 },
    ],
    assets: keys.map((key) => asset(key, averageUa)),
  });
}

describe("a world", () => {
  it("is the same for the same seed and acts, and another for another seed", () => {
    const lived = (seed: number): number[] => {
      const w = world(seed);
      w.swap("a", "good", FIRST_DAY + 0.4);
      w.step(FIRST_DAY + 60);
      return [1, 2, 3].map(
        (n) => w.measure("a", FIRST_DAY + 60 + n / 10, "resting").truth.millivolts,
      );
    };
    expect(lived(1)).toEqual(lived(1));
    expect(lived(1)).not.toEqual(lived(2));
  });

  it("can be copied: the copy goes on as the first would, and neither moves the other", () => {
    const first = world(5);
    first.swap("a", "good", FIRST_DAY);
    first.step(FIRST_DAY + 90);
    const copy = first.copy();
    const ahead = (w: World): unknown[] => {
      w.swap("b", "bad", FIRST_DAY + 100);
      w.step(FIRST_DAY + 200);
      const read = w.measure("a", FIRST_DAY + 200, "resting").millivolts;
      return [read, w.truth("a"), w.truth("b"), w.weather.meanC(FIRST_DAY + 190)];
    };
    const gone = ahead(copy);
    expect(first.truth("b")).toBeNull();
    expect(first.day).toBe(FIRST_DAY + 90);
    expect(ahead(first)).toEqual(gone);
  });

  it("leaves one asset's fate alone when another is visited, read and swapped", () => {
    const quiet = world(7);
    const busy = world(7);
    for (const w of [quiet, busy]) for (const key of ["a", "b"]) w.swap(key, "good", FIRST_DAY);
    quiet.step(FIRST_DAY + 200);
    for (let day = 1; day <= 200; day++) {
      busy.step(FIRST_DAY + day);
      busy.measure("b", FIRST_DAY + day, "loaded");
      if (day % 50 === 0) busy.swap("b", "good", FIRST_DAY + day);
    }
    expect(busy.truth("a")?.chargeLeft).toBeCloseTo(quiet.truth("a")?.chargeLeft ?? -1, 9);
    expect(busy.lookAhead("a", 900)).toBe(quiet.lookAhead("a", 900));
  });

  it("comes to pass as it was foreseen", () => {
    const w = world(3);
    w.swap("a", "good", FIRST_DAY + 0.3);
    w.step(FIRST_DAY + 40);
    const foreseen = w.lookAhead("a", 900);
    expect(foreseen).not.toBeNull();
    w.step(FIRST_DAY + 900);
    expect(w.stoppedAt("a")).toBeCloseTo(foreseen ?? 0, 6);
    w.swap("a", "good", FIRST_DAY + 900.5);
    expect(w.stoppedAt("a")).toBeNull();
  });

  // Common practice (no source): life is charge over current, less what the cold, ageing and the
  // cut-off take; 2.8 Ah is the rating of an LR6 at 25 mA (maker's sheet, second hand).
  it("lets packs live about their capacity over their current", () => {
    const keys = Array.from({ length: 60 }, (_, i) => `asset ${i}`);
    const w = world(11, keys);
    for (const key of keys) w.swap(key, "good", FIRST_DAY);
    const lives = keys
      .map((key) => (w.lookAhead(key, 2000) ?? Infinity) - FIRST_DAY)
      .sort((a, b) => a - b);
    const nominal = 2800 / 0.4 / 24;
    expect(lives[30]).toBeGreaterThan(nominal * 0.7);
    expect(lives[30]).toBeLessThan(nominal * 1.05);
    expect((lives[54] as number) / (lives[5] as number)).toBeGreaterThan(1.25);
  });

  it("ends a weak lot early", () => {
    const w = world(5);
    w.swap("a", "good", FIRST_DAY);
    const good = (w.lookAhead("a", 2000) ?? 0) - FIRST_DAY;
    w.swap("a", "bad", FIRST_DAY);
    const bad = (w.lookAhead("a", 2000) ?? 0) - FIRST_DAY;
    expect(bad / good).toBeGreaterThan(0.45);
    expect(bad / good).toBeLessThan(0.75);
  });

  it("lets firmware shorten life in proportion", () => {
    const w = world(6);
    w.swap("a", "good", FIRST_DAY);
    const before = (w.lookAhead("a", 2000) ?? 0) - FIRST_DAY;
    w.firmware("a", 1.5);
    const after = (w.lookAhead("a", 2000) ?? 0) - FIRST_DAY;
    expect(after / before).toBeGreaterThan(0.58);
    expect(after / before).toBeLessThan(0.78);
  });

  it("reads with scatter, and now and then grossly wrong", () => {
    const w = world(9);
    w.swap("a", "good", FIRST_DAY);
    w.step(FIRST_DAY + 30);
    const seen = Array.from({ length: 600 }, () => w.measure("a", FIRST_DAY + 30.4, "resting"));
    const slips = seen.filter((m) => m.truth.slip !== null).length;
    // 3 % of 600 is 18; 6 and 33 are its 0.1 and 99.9 % points (binomial).
    expect(slips).toBeGreaterThan(6);
    expect(slips).toBeLessThan(33);
    const honest = seen.filter((m) => m.truth.slip === null);
    expect(
      Math.max(...honest.map((m) => Math.abs(m.millivolts - m.truth.millivolts))),
    ).toBeLessThan(45);
  });

  it("names the asset or lot it does not know", () => {
    expect(() => world(1).swap("nobody", "good", FIRST_DAY)).toThrow("no asset called nobody");
    expect(() => world(1).swap("a", "no lot", FIRST_DAY)).toThrow("no lot called no lot");
  });
});

describe("independence", () => {
  const root = fileURLToPath(new URL("../../../scripts/simulate/", import.meta.url));
  const files = readdirSync(root, { recursive: true, encoding: "utf8" }).filter((f) =>
    f.endsWith(".ts"),
  );

  it("takes nothing from the product: no import leaves the simulator but for a time zone library", () => {
    expect(files.length).toBeGreaterThan(20);
    for (const file of files) {
      const text = readFileSync(join(root, file), "utf8");
      const imports = [...text.matchAll(/from "([^"]+)"/g)].map((m) => m[1] as string);
      for (const name of imports) expect(name, file).toMatch(/^\.\.?\/(?!\.\.)|^@date-fns\/tz$/);
      expect(text, file).not.toMatch(/Math\.random|Date\.now|new Date\(\)/);
    }
  });
});
