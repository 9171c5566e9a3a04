import { ESLint } from "eslint";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { plantTree, type PlantedTree } from "../support/planted-tree";

/** Every rule of the house that eslint judges is broken once on purpose. */
const lines = (count: number) =>
  Array.from({ length: count }, (_, index) => `export const line${index} = ${index};`).join("\n");
const statements = (count: number) =>
  Array.from({ length: count }, (_, index) => `  total += ${index};`).join("\n");
const long = (count: number) =>
  `export function long() {\n  let total = 0;\n${statements(count - 4)}\n  return total;\n}\n`;

/** what is wrong, file, source, rule that must name it */
const VIOLATIONS: readonly (readonly [string, string, string, string])[] = [
  ["the clock", "lib/battery/a.ts", "export const a = Date.now();", "no-restricted-syntax"],
  [
    "the clock, hidden",
    "lib/battery/b.ts",
    `export const a = Date["now"]();`,
    "no-restricted-syntax",
  ],
  ["a new Date()", "lib/battery/c.ts", "export const a = new Date();", "no-restricted-syntax"],
  ["a bare Date()", "lib/battery/d.ts", "export const a = Date();", "no-restricted-syntax"],
  ["chance", "lib/routing/a.ts", "export const a = Math.random();", "no-restricted-syntax"],
  [
    "chance, by alias",
    "lib/routing/b.ts",
    "const { random } = Math;\nexport const a = random();",
    "no-restricted-syntax",
  ],
  [
    "the environment",
    "lib/routing/c.ts",
    "export const a = process.env.HOME;",
    "no-restricted-syntax",
  ],
  [
    "the environment, by another way",
    "lib/routing/d.ts",
    "export const a = globalThis;",
    "no-restricted-globals",
  ],
  ["the clock in stats", "lib/stats/a.ts", "export const a = new Date();", "no-restricted-syntax"],
  [
    "the clock in planning",
    "lib/planning/a.ts",
    "export const a = Date.now();",
    "no-restricted-syntax",
  ],
  [
    "the clock in present",
    "lib/present/a.ts",
    "export const a = Date.now();",
    "no-restricted-syntax",
  ],
  ["the clock in sync", "lib/sync/a.ts", "export const a = Date.now();", "no-restricted-syntax"],
  [
    "a stopwatch in a core",
    "lib/routing/e.ts",
    "export const a = performance.now();",
    "no-restricted-globals",
  ],
  [
    "the network in a core",
    "lib/present/b.ts",
    `export const a = fetch("/");`,
    "no-restricted-globals",
  ],
  [
    "chance from crypto",
    "lib/battery/e.ts",
    "export const a = crypto.randomUUID();",
    "no-restricted-globals",
  ],
  [
    "the clock in a use case",
    "lib/usecases/a.ts",
    "export const a = new Date();",
    "no-restricted-syntax",
  ],
  [
    "the clock in a query",
    "db/queries/a.ts",
    "export const a = new Date();",
    "no-restricted-syntax",
  ],
  [
    "the environment in a query",
    "db/queries/b.ts",
    "export const a = process.env.HOME;",
    "no-restricted-syntax",
  ],
  [
    "the environment in a page",
    "app/env/page.tsx",
    "export const a = process.env.HOME;",
    "no-restricted-syntax",
  ],
  [
    "the environment in a component",
    "components/a.tsx",
    "export const a = process.env.HOME;",
    "no-restricted-syntax",
  ],
  ["a default export", "lib/present/c.ts", "export default 1;", "no-restricted-syntax"],
  [
    "the alias in a core that stands alone",
    "lib/battery/f.ts",
    `export * from "@/lib/units";`,
    "no-restricted-imports",
  ],
  [".js in an import", "lib/present/d.ts", `export * from "./a.js";`, "no-restricted-imports"],
  ["any", "lib/present/e.ts", "export const a: any = 1;", "@typescript-eslint/no-explicit-any"],
  [
    "a silenced type error",
    "lib/present/f.ts",
    "// @ts-expect-error because\nexport const a: string = 1;",
    "@typescript-eslint/ban-ts-comment",
  ],
  [
    "a lost promise",
    "lib/usecases/b.ts",
    "const wait = async () => 1;\nexport const go = () => { wait(); };",
    "@typescript-eslint/no-floating-promises",
  ],
  ["printing", "lib/usecases/c.ts", `console.log("x"); export const a = 1;`, "no-console"],
  [
    "raw HTML",
    "components/b.tsx",
    `export const A = () => <p dangerouslySetInnerHTML={{ __html: "x" }} />;`,
    "react/no-danger",
  ],
  ["a name in camel case", "lib/present/camelCase.ts", "export const a = 1;", "house/file-name"],
  ["a drawer for odds and ends", "lib/present/utils.ts", "export const a = 1;", "house/file-name"],
  ["a barrel", "components/index.ts", "export const a = 1;", "house/file-name"],
  ["a page of 41 lines", "app/long/page.tsx", lines(41), "max-lines"],
  ["a route of 31 lines", "app/api/long/route.ts", lines(31), "max-lines"],
  ["a component of 151 lines", "components/long.tsx", lines(151), "max-lines"],
  ["a module of 251 lines", "lib/present/long.ts", lines(251), "max-lines"],
  ["a function of 41 lines", "lib/present/long-function.ts", long(41), "max-lines-per-function"],
];

/** Just within the budgets, or a need that the rules allow for. */
const ALLOWED: readonly (readonly [string, string])[] = [
  ["app/short/page.tsx", lines(40)],
  ["app/api/short/route.ts", lines(30)],
  ["components/short.tsx", lines(150)],
  ["lib/present/short.ts", lines(250)],
  ["lib/present/short-function.ts", long(40)],
  ["lib/present/given-clock.ts", "export const at = (now: Date) => new Date(now.getTime());"],
  ["lib/battery/index.ts", "export const a = 1;"],
  ["lib/server/clock.ts", "export const now = () => new Date();"],
  ["app/default/page.tsx", "export default function Page() {\n  return null;\n}"],
  ["migrations/20260101_01_first.ts", "export const a = 1;"],
];

const judged = new Map<string, string[]>();
let tree: PlantedTree;

beforeAll(async () => {
  const silenced = "// eslint-disable-next-line no-console\nconsole.log(1); export const a = 1;";
  tree = plantTree({
    ...Object.fromEntries(VIOLATIONS.map(([, file, source]) => [file, `${source}\n`])),
    ...Object.fromEntries(ALLOWED.map(([file, source]) => [file, `${source}\n`])),
    "lib/usecases/silenced.ts": silenced,
  });
  const eslint = new ESLint({ cwd: tree.root });
  for (const { filePath, messages } of await eslint.lintFiles(["."])) {
    const rules = messages.map(({ ruleId, message }) => ruleId ?? message);
    judged.set(filePath.slice(tree.root.length + 1), rules);
  }
});
afterAll(() => tree.remove());

describe("lint", () => {
  it.each(VIOLATIONS)("refuses %s (%s)", (_, file, __, rule) => {
    expect(judged.get(file)).toContain(rule);
  });

  it.each(ALLOWED)("lets %s be", (file) => {
    expect(judged.get(file)).toEqual([]);
  });

  it("cannot be silenced by a comment", () => {
    expect(judged.get("lib/usecases/silenced.ts")).toContain("no-console");
  });
});
