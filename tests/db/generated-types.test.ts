/** The types in db/tables are those of the live schema: a migration without them fails here. */
import { execFile } from "node:child_process";
import { fileURLToPath } from "node:url";
import { promisify } from "node:util";
import { expect, it } from "vitest";
import { testDatabase } from "../support/database";

const { url } = await testDatabase();
const root = fileURLToPath(new URL("../../", import.meta.url));

it("are up to date (`npx kysely-codegen` against a migrated database mends this)", async () => {
  const verify = promisify(execFile)("node_modules/.bin/kysely-codegen", ["--verify"], {
    cwd: root,
    env: { ...process.env, DATABASE_URL: url },
  });
  await expect(verify).resolves.toBeDefined();
});
