import { execFile } from "node:child_process";
import { createRequire } from "node:module";
import { join } from "node:path";
import { promisify } from "node:util";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { plantTree, type PlantedTree } from "../support/planted-tree";

/**
 * Every import rule is broken once on purpose; the real configuration must name it. The truth
 * is the list "Who may import whom" in DEVELOPERS.md; dependency-cruiser is the judge.
 */
const TARGETS: Record<string, string> = {
  "lib/units.ts": "export const MS = 1;",
  "lib/errors.ts": "export const CODE = 1;",
  "lib/env.ts": "export const ENV = 1;",
  "lib/stats/quantile.ts": "export const quantile = 1;",
  "lib/battery/forecast.ts": "export const forecast = 1;\nexport interface Forecast { at: number }",
  "lib/routing/solve.ts": "export const solve = 1;",
  "lib/planning/plan.ts": "export const plan = 1;",
  "lib/present/label.ts": "export const label = 1;",
  "lib/sync/mutation.ts": "export const mutation = 1;",
  "lib/offline/store.ts": "export const store = 1;",
  "lib/usecases/plan-week.ts": "export const planWeek = 1;",
  "lib/server/session.ts": "export const session = 1;",
  "db/client.ts": "export const client = 1;",
  "db/queries/packs.ts": "export const packs = 1;",
  "migrations/20260101_01_first.ts": "export const up = 1;",
  "emails/round.tsx": "export const round = 1;",
  "components/charts/disc.tsx": "export const disc = 1;",
  "app/page.tsx": "export const page = 1;",
  "scripts/worker.ts": "export const worker = 1;",
  "tests/support/database.ts": "export const database = 1;",
};

const from = (module: string) => `import * as taken from "${module}";\nexport const kept = taken;`;

/** rule, the file that breaks it, what it imports */
const VIOLATIONS: readonly (readonly [rule: string, file: string, module: string])[] = [
  ["base", "lib/stats/a.ts", "../battery/forecast"],
  ["base", "lib/stats/b.ts", "node:fs"],
  ["base", "lib/stats/c.ts", "zod"],
  ["battery", "lib/battery/a.ts", "../routing/solve"],
  ["battery", "lib/battery/b.ts", "react"],
  ["battery", "lib/battery/c.ts", "node:crypto"],
  ["battery", "lib/battery/d.ts", "date-fns"],
  ["battery", "lib/battery/e.ts", "../env"],
  ["battery", "lib/battery/f.ts", "kysely"],
  ["battery", "lib/battery/g.ts", "next/headers"],
  ["routing", "lib/routing/a.ts", "../battery/forecast"],
  ["routing", "lib/routing/b.ts", "zod"],
  ["routing", "lib/routing/c.ts", "node:perf_hooks"],
  ["planning", "lib/planning/a.ts", "../present/label"],
  ["planning", "lib/planning/b.ts", "@/db/queries/packs"],
  ["planning", "lib/planning/c.ts", "kysely"],
  ["present", "lib/present/a.ts", "../usecases/plan-week"],
  ["present", "lib/present/b.ts", "react"],
  ["present", "lib/present/c.ts", "../sync/mutation"],
  ["csv", "lib/csv/a.ts", "../battery/forecast"],
  ["csv", "lib/csv/b.ts", "node:fs"],
  ["sync", "lib/sync/a.ts", "../battery/forecast"],
  ["sync", "lib/sync/b.ts", "kysely"],
  ["db", "db/queries/a.ts", "@/lib/usecases/plan-week"],
  ["db", "db/queries/b.ts", "@/lib/battery/forecast"],
  ["db-no-framework", "db/queries/c.ts", "next/cache"],
  ["usecases", "lib/usecases/a.ts", "@/lib/server/session"],
  ["usecases", "lib/usecases/b.ts", "@/lib/env"],
  ["usecases", "lib/usecases/c.ts", "@/components/charts/disc"],
  ["usecases-no-framework", "lib/usecases/d.ts", "next/navigation"],
  ["usecases-no-framework", "lib/usecases/e.ts", "react"],
  ["sql-lives-in-db", "lib/usecases/f.ts", "pg"],
  ["sql-lives-in-db", "lib/server/a.ts", "pg"],
  ["server", "lib/server/b.ts", "@/app/page"],
  ["server", "lib/server/c.ts", "@/components/charts/disc"],
  ["offline", "lib/offline/a.ts", "@/lib/usecases/plan-week"],
  ["offline", "lib/offline/b.ts", "@/db/client"],
  ["offline-no-framework", "lib/offline/c.ts", "next/navigation"],
  ["offline-no-node", "lib/offline/d.ts", "node:fs"],
  ["emails", "emails/a.tsx", "@/db/queries/packs"],
  ["components", "components/charts/a.tsx", "@/lib/battery/forecast"],
  ["components", "components/charts/b.tsx", "@/lib/usecases/plan-week"],
  ["components-no-back-end", "components/charts/c.tsx", "@/db/queries/packs"],
  ["components-no-back-end", "components/charts/d.tsx", "@/app/page"],
  ["app-never-db", "app/a.tsx", "@/db/client"],
  ["app-never-db", "app/api/b.ts", "@/db/queries/packs"],
  ["app-never-db", "proxy.ts", "@/db/client"],
  ["app", "app/c.tsx", "@/lib/battery/forecast"],
  ["app", "app/d.tsx", "@/lib/env"],
  ["app-no-scripts", "app/e.tsx", "@/scripts/worker"],
  ["migrations", "migrations/20260101_02_second.ts", "../lib/units"],
  ["migrations-packages", "migrations/20260101_03_third.ts", "zod"],
  ["product-without-scripts", "lib/usecases/g.ts", "@/scripts/worker"],
  ["product-without-scripts", "components/charts/e.tsx", "@/tests/support/database"],
  ["no-circles", "lib/present/circle-a.ts", "./circle-b"],
  ["resolvable", "lib/present/lost.ts", "./nowhere"],
  ["no-development-packages", "lib/server/d.ts", "vitest"],
];

/** What the rules must let through. */
const ALLOWED: readonly (readonly [file: string, source: string])[] = [
  ["lib/battery/fine.ts", from("../stats/quantile")],
  ["lib/planning/fine.ts", `${from("../battery/forecast")}\nexport * from "../routing/solve";`],
  ["lib/present/fine.ts", from("d3-scale")],
  ["lib/csv/fine.ts", from("csv-parse/sync")],
  ["lib/sync/fine.ts", from("zod")],
  ["lib/usecases/fine.ts", `${from("@/db/queries/packs")}\nexport * from "@/lib/planning/plan";`],
  ["lib/server/fine.ts", `${from("@/lib/usecases/plan-week")}\nexport * from "@/db/client";`],
  ["lib/offline/fine.ts", from("@/lib/sync/mutation")],
  [
    "components/charts/fine.tsx",
    `import type { Forecast } from "@/lib/battery/forecast";\nexport const kept = (f: Forecast) => f.at;`,
  ],
  [
    "app/fine.tsx",
    `${from("@/lib/usecases/plan-week")}\nexport * from "@/components/charts/disc";`,
  ],
  ["migrations/20260101_04_fine.ts", from("kysely")],
];

interface Violation {
  readonly from: string;
  readonly rule: { readonly name: string; readonly severity: string };
}

let tree: PlantedTree;
let found: Violation[] = [];

beforeAll(async () => {
  const planted = VIOLATIONS.map(([, file, module]) => [file, from(module)]);
  const circle = { "lib/present/circle-b.ts": from("./circle-a") };
  const allowed = Object.fromEntries(ALLOWED);
  tree = plantTree({ ...TARGETS, ...Object.fromEntries(planted), ...circle, ...allowed });
  found = await cruise(tree.root);
});
afterAll(() => tree.remove());

async function cruise(cwd: string): Promise<Violation[]> {
  const program = join(cwd, "node_modules/dependency-cruiser/bin/dependency-cruise.mjs");
  const folders = ["app", "components", "lib", "db", "migrations", "emails", "proxy.ts"];
  const options = ["--config", ".dependency-cruiser.cjs", "--output-type", "json"];
  options.push("--preserve-symlinks"); // the packages are a link here
  const run = promisify(execFile)(process.execPath, [program, ...options, ...folders], {
    cwd,
    maxBuffer: 64 * 1024 * 1024,
  });
  // The exit code is the number of errors; the report is on standard output either way.
  const { stdout } = await run.catch((error: { stdout: string }) => error);
  return JSON.parse(stdout).summary.violations as Violation[];
}

const rulesBrokenBy = (file: string) =>
  found.filter((violation) => violation.from === file).map(({ rule }) => rule.name);

describe("import rules", () => {
  it.each(VIOLATIONS)("%s: %s may not import %s", (rule, file) => {
    expect(rulesBrokenBy(file)).toContain(rule);
  });

  it.each(ALLOWED)("lets %s be", (file) => {
    expect(rulesBrokenBy(file)).toEqual([]);
  });

  it("are errors, every one", () => {
    expect(new Set(found.map(({ rule }) => rule.severity))).toEqual(new Set(["error"]));
  });

  it("are all broken once here", () => {
    const config = createRequire(import.meta.url)("../../.dependency-cruiser.cjs") as {
      forbidden: { name: string }[];
    };
    const names = config.forbidden.map(({ name }) => name).sort();
    const planted = new Set([...VIOLATIONS.map(([rule]) => rule), "declared-packages"]);
    expect([...planted].sort()).toEqual(names);
  });
});
