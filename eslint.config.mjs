import next from "eslint-config-next";
import typescript from "eslint-config-next/typescript";
import { house } from "./scripts/lint/house-rules.mjs";

const PURE_CORES = ["lib/units.ts", "lib/errors.ts"].concat(
  ["stats", "battery", "routing", "planning", "present", "csv", "sync"].map(
    (core) => `lib/${core}/**/*.ts`,
  ),
);
const CLOCK_GIVEN = [...PURE_CORES, "lib/usecases/**/*.ts", "db/**/*.ts", "emails/**/*.{ts,tsx}"];
/** The places that read the configuration: parsed once at boot, then passed on. */
const READS_ENVIRONMENT = ["lib/env.ts", "lib/server/**", "db/client.ts"];

const clockAndChance = [
  ["NewExpression[callee.name='Date'][arguments.length=0]", "Take the time as an argument."],
  ["CallExpression[callee.name='Date']", "Take the time as an argument."],
  ["MemberExpression[object.name='Date'][property.name='now']", "Take the time as an argument."],
  ["MemberExpression[object.name='Date'][property.value='now']", "Take the time as an argument."],
  [
    "MemberExpression[object.name='Math'][property.name='random']",
    "Take a generator as an argument.",
  ],
  [
    "MemberExpression[object.name='Math'][property.value='random']",
    "Take a generator as an argument.",
  ],
  [
    "VariableDeclarator[init.name=/^(Math|Date)$/]",
    "Write Math.x and Date.x out; aliases hide the clock.",
  ],
].map(([selector, message]) => ({ selector, message }));

const environment = {
  selector: "MemberExpression[object.name='process'][property.name='env']",
  message: "Configuration is parsed once (lib/env.ts) and passed in.",
};
const defaultExport = {
  selector: "ExportDefaultDeclaration",
  message: "Use a named export; only Next.js's own files have a default one.",
};

/** Names that only a machine with a clock, chance, a network or a page has. */
const IMPURE_GLOBALS = [
  ...["process", "performance", "crypto", "fetch", "XMLHttpRequest", "WebSocket", "globalThis"],
  ...["setTimeout", "setInterval", "setImmediate", "queueMicrotask", "requestAnimationFrame"],
  ...["window", "document", "navigator", "localStorage", "indexedDB", "console", "require"],
].map((name) => ({ name, message: "The pure cores reach for nothing: take it as an argument." }));

/**
 * @param {string} name
 * @param {string[]} files
 * @param {import("eslint").Linter.RulesRecord} rules
 * @param {string[]} [ignores]
 */
const rule = (name, files, rules, ignores) => ({ name, files, rules, ...(ignores && { ignores }) });
const lines = (max) => ({ max, skipBlankLines: true, skipComments: true });
const budget = (max) => ({ "max-lines": ["error", lines(max)] });
const functionBudget = (max) => ({ "max-lines-per-function": ["error", lines(max)] });
const syntax = (...list) => ({ "no-restricted-syntax": ["error", ...list] });
const NEXT_FILES = ["app/**/*.{ts,tsx}", "proxy.ts", "*.config.{ts,mjs}", "instrumentation.ts"];

/** @type {import("eslint").Linter.Config[]} */
const config = [
  { ignores: [".next*/**", ".wanewright/**", "coverage/**", "public/**", "next-env.d.ts"] },
  ...next,
  ...typescript,
  {
    name: "house/every-file",
    plugins: { house },
    linterOptions: { noInlineConfig: true, reportUnusedDisableDirectives: "error" },
    rules: {
      "house/file-name": "error",
      "no-console": "error",
      eqeqeq: "error",
      "no-var": "error",
      "prefer-const": "error",
      ...budget(250),
      ...functionBudget(40),
      ...syntax(defaultExport),
    },
  },
  {
    name: "house/typed",
    files: ["**/*.{ts,tsx}"],
    languageOptions: {
      parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname },
    },
    rules: {
      "@typescript-eslint/no-explicit-any": "error",
      "@typescript-eslint/ban-ts-comment": [
        "error",
        { minimumDescriptionLength: 0, "ts-expect-error": true },
      ],
      "@typescript-eslint/consistent-type-imports": ["error", { fixStyle: "inline-type-imports" }],
      "@typescript-eslint/no-unused-vars": [
        "error",
        { argsIgnorePattern: "^_", varsIgnorePattern: "^_" },
      ],
      "@typescript-eslint/no-unused-expressions": "error",
      "@typescript-eslint/no-floating-promises": "error",
      "@typescript-eslint/await-thenable": "error",
      "no-restricted-imports": [
        "error",
        { patterns: [{ regex: "^(\\.|@/).*\\.js$", message: "No .js in imports of ours." }] },
      ],
    },
  },
  rule("house/next-default-exports", NEXT_FILES, syntax(environment)),
  rule("house/configuration", ["*.config.{ts,mjs}"], { "no-restricted-syntax": "off" }),
  rule(
    "house/environment",
    ["lib/**", "db/**", "components/**", "emails/**"],
    syntax(defaultExport, environment),
    READS_ENVIRONMENT,
  ),
  rule("house/clock-given", CLOCK_GIVEN, syntax(defaultExport, environment, ...clockAndChance)),
  rule("house/pure-cores", PURE_CORES, { "no-restricted-globals": ["error", ...IMPURE_GLOBALS] }),
  rule("house/cores-stand-alone", ["lib/{battery,routing,stats}/**/*.ts", "lib/units.ts"], {
    "no-restricted-imports": [
      "error",
      {
        patterns: [
          { regex: "^@/|\\.js$", message: "This core stands alone: relative imports, no .js." },
        ],
      },
    ],
  }),
  rule("house/components", ["**/*.tsx"], {
    ...budget(150),
    "max-lines-per-function": "off",
    "react/no-danger": "error",
  }),
  rule("house/not-for-us", ["**/*.{mjs,ts,tsx}"], {
    "@next/next/no-assign-module-variable": "off",
    "import/no-anonymous-default-export": "off",
  }),
  rule("house/pages", ["app/**/page.tsx"], budget(40)),
  rule("house/routes", ["app/**/route.ts"], budget(30)),
  // A solver's or a filter's documented main loop reads better whole.
  rule("house/main-loops", ["lib/routing/solve.ts", "lib/battery/filter.ts"], functionBudget(60)),
  rule("house/migrations", ["migrations/**"], { "max-lines-per-function": "off" }),
  rule("house/tests", ["tests/**", "*.config.*"], {
    ...budget(400),
    "max-lines-per-function": "off",
  }),
  rule("house/command-line", ["scripts/**", "tests/**"], { "no-console": "off" }),
  rule("house/generated", ["db/tables/generated.ts"], { "max-lines": "off" }),
  {
    name: "house/common-js",
    files: ["**/*.cjs"],
    rules: { "@typescript-eslint/no-require-imports": "off" },
  },
];

export default config;
