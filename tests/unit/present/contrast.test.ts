import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";

/**
 * Contrast as WCAG 2.2 defines it ("relative luminance" and "contrast ratio",
 * https://www.w3.org/TR/WCAG22/#dfn-relative-luminance, #dfn-contrast-ratio). Limits: 4.5:1 for
 * text (SC 1.4.3), 7:1 on the phone (SC 1.4.6), 3:1 for strokes that carry meaning (SC 1.4.11).
 */
function luminance(hex: string): number {
  const channel = (at: number) => {
    const c = parseInt(hex.slice(at, at + 2), 16) / 255;
    return c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4;
  };
  return 0.2126 * channel(1) + 0.7152 * channel(3) + 0.0722 * channel(5);
}

function contrast(a: string, b: string): number {
  const [light, dark] = [luminance(a), luminance(b)].sort((x, y) => y - x) as [number, number];
  return (light + 0.05) / (dark + 0.05);
}

type Tokens = Record<string, { day: string; night: string }>;

const css = readFileSync(new URL("../../../app/globals.css", import.meta.url), "utf8");

function tokensOf(selector: string): Tokens {
  const start = css.indexOf(`${selector} {`);
  const block = css.slice(start, css.indexOf("}", start));
  const found = block.matchAll(/--([\w-]+): light-dark\((#[0-9a-f]{6}), (#[0-9a-f]{6})\)/g);
  return Object.fromEntries(
    [...found].map(([, name, day, night]) => [name, { day, night }]),
  ) as Tokens;
}

const office = tokensOf(":root");
const field = { ...office, ...tokensOf('[data-surface="field"]') };

/** Every text colour with the grounds that it stands on. */
const grounds = ["paper", "sheet", "picked"];
const textPairs: [string, string][] = [
  ...["ink", "soft", "spruce-ink", "honey-ink", "brick-ink", "dusk-ink"].flatMap((text) =>
    grounds.map((ground): [string, string] => [text, ground]),
  ),
  ...["spruce", "honey", "brick", "dusk"].flatMap((colour): [string, string][] => [
    ["ink", `${colour}-tint`],
    ["soft", `${colour}-tint`],
    [`${colour}-ink`, `${colour}-tint`],
  ]),
  ["ink", "hair"],
  ["soft", "hair"],
  ["paper", "ink"],
  ["on-bar", "bar"],
];
const onPlain: [string, string][] = [
  ["on-spruce", "spruce"],
  ["on-brick", "brick"],
  ["on-dusk", "dusk"],
];
const strokes: [string, string][] = ["spruce", "honey", "brick", "dusk"].flatMap((colour) =>
  [...grounds, `${colour}-tint`].map((ground): [string, string] => [`${colour}-line`, ground]),
);

function failures(tokens: Tokens, pairs: [string, string][], least: number): string[] {
  return pairs.flatMap(([text, ground]) =>
    (["day", "night"] as const).flatMap((time) => {
      const [a, b] = [tokens[text], tokens[ground]];
      if (!a || !b) return [`${text} or ${ground} is no token`];
      const ratio = contrast(a[time], b[time]);
      return ratio >= least ? [] : [`${text} on ${ground} by ${time}: ${ratio.toFixed(2)}`];
    }),
  );
}

describe("contrast of the tokens", () => {
  it("computes the ratios that WCAG states", () => {
    // WCAG 2.2 on contrast ratio: they range from 1 to 21.
    expect(contrast("#000000", "#ffffff")).toBeCloseTo(21, 10);
    expect(contrast("#a8321c", "#a8321c")).toBe(1);
    // Common practice, no source: #767676 is the lightest grey on white that passes, #777777 fails.
    expect(contrast("#767676", "#ffffff")).toBeGreaterThanOrEqual(4.5);
    expect(contrast("#777777", "#ffffff")).toBeLessThan(4.5);
  });
  it("holds 4.5:1 for text in the office, by day and by night", () => {
    expect(failures(office, [...textPairs, ...onPlain], 4.5)).toEqual([]);
  });
  it("holds 7:1 for text on the phone, by day and by night", () => {
    expect(failures(field, [...textPairs, ["on-spruce", "spruce"]], 7)).toEqual([]);
  });
  it("holds 3:1 for strokes that carry meaning", () => {
    expect(failures(office, strokes, 3)).toEqual([]);
    expect(failures(office, [["soft", "sheet"]], 3)).toEqual([]);
  });
  it("would notice honey as text on paper", () => {
    expect(failures(office, [["honey", "paper"]], 4.5)).toHaveLength(1);
  });
  it("names every colour that Tailwind knows, and no other", async () => {
    const { default: config } = await import("../../../tailwind.config");
    const colours = Object.keys(config.theme?.colors ?? {});
    const declared = Object.keys(office);
    expect(colours.filter((name) => name !== "transparent" && name !== "current").sort()).toEqual(
      declared.sort(),
    );
  });
});
