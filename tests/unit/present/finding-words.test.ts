/** Findings in words; the sentences by hand. */
import { expect, test } from "vitest";
import { findingWords } from "@/lib/present/finding-words";

const plain = (text: string) => text.replaceAll("\u00a0", " ");
const lot = { kind: "bad-lot" as const, lotCode: "LR6-010", modelName: null, since: null };
const shift = { kind: "draw-shift" as const, lotCode: null, modelName: "RG1", since: "2026-08-06" };

test("a weak lot: its code, by how much shorter, and three things to do", () => {
  const words = findingWords({ ...lot, factor: 0.61 }, "en-GB");
  expect(words.title).toBe("Weak lot LR6-010");
  expect(plain(words.evidence)).toContain("39 % shorter");
  expect(words.todo).toHaveLength(3);
});

test.each([
  [1.34, "RG1 draws 34 % more"],
  [0.8, "RG1 draws 20 % less"],
  [2.6, "RG1 draws 2.6 times as much"],
])("a draw of %d times what it was", (factor, title) => {
  expect(plain(findingWords({ ...shift, factor }, "en-GB").title)).toBe(title);
});

test("says around when", () => {
  expect(findingWords({ ...shift, factor: 1.3 }, "en-GB").evidence).toContain("6 Aug 2026");
});
