/**
 * Who may import whom. Every rule is an error, and every rule has a planted violation in
 * tests/architecture that proves it fires.
 */
const BASE = "^lib/(units|errors)\\.ts$|^lib/stats/";
const PURE = "^lib/(battery|routing|planning|present|csv)/";
/** Published libraries without a clock, chance, a page or a network in them. */
const CALENDAR = "^node_modules/(date-fns|@date-fns/tz)/";
const GRAPH = "^node_modules/@dagrejs/graphlib/";
const DRAWING = "^node_modules/(d3-scale|d3-shape|@types/d3-scale|@types/d3-shape)/";
const CSV = "^node_modules/(csv-parse|csv-stringify)/";
const ZOD = "^node_modules/zod/";
const NPM = "^node_modules/";
const FRAMEWORK = "^node_modules/(next|react|react-dom|next-auth|@auth/core)/";
const OURS = "^(app|components|lib|db|migrations|emails|scripts|tests)/";

/**
 * Everything outside the list is an error, packages and Node's own modules included.
 * @param {string} name
 * @param {string} from
 * @param {string[]} allowed
 * @param {string} comment
 */
const only = (name, from, allowed, comment) => ({
  name,
  comment,
  severity: "error",
  from: { path: from },
  to: { pathNot: allowed.join("|") },
});

/**
 * @param {string} name
 * @param {{ path: string, pathNot?: string }} from
 * @param {object} to
 * @param {string} comment
 */
const never = (name, from, to, comment) => ({ name, comment, severity: "error", from, to });

const cores = [
  only("base", BASE, [BASE], "units, errors and stats know each other only"),
  only("battery", "^lib/battery/", [BASE, "^lib/battery/"], "battery: the base only"),
  only("routing", "^lib/routing/", [BASE, "^lib/routing/"], "routing: the base only"),
  only(
    "planning",
    "^lib/planning/",
    [BASE, "^lib/(battery|routing|planning)/", CALENDAR, GRAPH],
    "planning joins battery and routing; of packages only the calendar and shortest paths",
  ),
  only("present", "^lib/present/", [BASE, PURE, CALENDAR, DRAWING], "present: the pure ones"),
  only("csv", "^lib/csv/", [BASE, "^lib/csv/", CALENDAR, CSV], "csv: text to typed rows and back"),
  only("sync", "^lib/sync/", [BASE, "^lib/sync/", ZOD], "sync: the base and zod"),
];

const layers = [
  never(
    "db",
    { path: "^db/" },
    { path: OURS, pathNot: `^db/|${BASE}` },
    "db: the base only (db/migrate.ts reads migrations by name)",
  ),
  never("db-no-framework", { path: "^db/" }, { path: FRAMEWORK }, "db knows no page"),
  never(
    "usecases",
    { path: "^lib/usecases/" },
    { path: OURS, pathNot: `^lib/(usecases|sync)/|^db/|^emails/|${PURE}|${BASE}` },
    "use cases: the pure ones, sync, db, emails",
  ),
  never(
    "usecases-no-framework",
    { path: "^lib/usecases/" },
    { path: FRAMEWORK },
    "use cases serve pages, routes and the worker alike: no next, no react",
  ),
  never(
    "sql-lives-in-db",
    { path: "^(app|components|emails|lib)/" },
    { path: "^node_modules/(pg|@types/pg)/" },
    "the driver is reached through db/client.ts only",
  ),
  never(
    "server",
    { path: "^lib/server/" },
    { path: "^(app|components|emails|migrations|scripts|tests)/" },
    "server: lib and db",
  ),
  never(
    "offline",
    { path: "^lib/offline/" },
    { path: OURS, pathNot: `^lib/(offline|sync)/|${PURE}|${BASE}` },
    "offline: sync and the pure ones",
  ),
  never("offline-no-framework", { path: "^lib/offline/" }, { path: FRAMEWORK }, "a browser store"),
  never(
    "offline-no-node",
    { path: "^lib/offline/" },
    { dependencyTypes: ["core"] },
    "it runs in a browser",
  ),
  never(
    "emails",
    { path: "^emails/" },
    { path: OURS, pathNot: `^emails/|^lib/present/|${BASE}` },
    "mails receive finished labels",
  ),
];

const entrances = [
  never(
    "components",
    { path: "^components/" },
    { path: "^lib/", pathNot: "^lib/present/", dependencyTypesNot: ["type-only"] },
    "components draw prepared models: present, and types",
  ),
  never(
    "components-no-back-end",
    { path: "^components/" },
    { path: "^(app|db|migrations|emails|scripts|tests)/" },
    "components: props in, callbacks out",
  ),
  never("app-never-db", { path: "^(app/|proxy\\.ts)" }, { path: "^db/" }, "app never touches db"),
  never(
    "app",
    { path: "^(app/|proxy\\.ts)" },
    {
      path: "^lib/",
      pathNot: `^lib/(usecases|server|present|offline)/|${BASE}`,
      dependencyTypesNot: ["type-only"],
    },
    "app: use cases, server, present, components, offline",
  ),
  never(
    "app-no-scripts",
    { path: "^app/" },
    { path: "^(migrations|emails|scripts|tests)/" },
    "entrances are thin",
  ),
];

const frozen = [
  never("migrations", { path: "^migrations/" }, { path: OURS }, "migrations are frozen"),
  never(
    "migrations-packages",
    { path: "^migrations/" },
    { path: NPM, pathNot: "^node_modules/kysely/" },
    "a migration needs Kysely and nothing else",
  ),
  never(
    "product-without-scripts",
    { path: "^(components|lib|db)/" },
    { path: "^(scripts|tests|migrations)/" },
    "the product does not lean on its tools",
  ),
];

const general = [
  never("no-circles", { path: OURS }, { circular: true }, "no import leads back to itself"),
  never("resolvable", { path: OURS }, { couldNotResolve: true }, "every import must exist"),
  never(
    "no-development-packages",
    { path: "^(app|components|lib|db|emails|migrations)/" },
    { dependencyTypes: ["npm-dev"], dependencyTypesNot: ["type-only"], pathNot: "@types/" },
    "what runs in production is a dependency, not a development dependency",
  ),
  never(
    "declared-packages",
    { path: OURS },
    { dependencyTypes: ["npm-no-pkg", "npm-unknown"] },
    "every package that is imported stands in package.json",
  ),
];

/** @type {import("dependency-cruiser").IConfiguration} */
module.exports = {
  forbidden: [...cores, ...layers, ...entrances, ...frozen, ...general],
  options: {
    doNotFollow: { path: "node_modules" },
    exclude: { path: "^(\\.next[^/]*|\\.wanewright|public)/" },
    tsPreCompilationDeps: true,
    tsConfig: { fileName: "tsconfig.json" },
    combinedDependencies: false,
    enhancedResolveOptions: {
      exportsFields: ["exports"],
      conditionNames: ["import", "require", "node", "default", "types"],
      mainFields: ["module", "main", "types"],
    },
  },
};
