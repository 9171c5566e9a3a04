import { fileURLToPath } from "node:url";
import { defineConfig } from "vitest/config";

const root = fileURLToPath(new URL(".", import.meta.url));

/** Alone: needs nothing but Node. With a database: TEST_DATABASE_URL, see tests/support/database.ts. */
export default defineConfig({
  resolve: { alias: { "@": root.replace(/\/$/, "") } },
  test: {
    // Mistakes of the local time zone must show wherever the tests run.
    env: { TZ: "Pacific/Chatham" },
    projects: [
      {
        extends: true,
        test: { name: "unit", include: ["tests/unit/**/*.test.{ts,tsx,mjs}"], testTimeout: 20_000 },
      },
      {
        extends: true,
        test: {
          name: "db",
          include: ["tests/db/**/*.test.{ts,mjs}"],
          globalSetup: ["tests/support/template-database.ts"],
          testTimeout: 30_000,
          hookTimeout: 60_000,
          maxWorkers: 2,
        },
      },
      {
        extends: true,
        test: {
          name: "architecture",
          include: ["tests/architecture/**/*.test.ts"],
          testTimeout: 120_000,
          hookTimeout: 120_000,
        },
      },
      {
        extends: true,
        test: {
          name: "e2e",
          include: ["tests/e2e/**/*.test.ts"],
          testTimeout: 120_000,
          hookTimeout: 120_000,
          fileParallelism: false,
        },
      },
    ],
  },
});
