import { chmodSync, mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { newPassword, startPostgres } from "./postgres.mjs";

const FIRST_PORT = 54_600;

/**
 * A server whose data may be lost, removed when the run ends.
 * @param {import("./lifetime.mjs").Lifetime} life
 */
export async function startTemporaryPostgres(life) {
  const folder = mkdtempSync(join(tmpdir(), "wanewright-test-"));
  life.onEnd("temporary folder", () => rmSync(folder, { recursive: true, force: true }));
  chmodSync(folder, 0o711); // the user `postgres` must pass through
  const place = { home: join(folder, "postgres"), password: newPassword() };
  const server = await startPostgres(place, { firstPort: FIRST_PORT, losable: true });
  life.onEnd("temporary PostgreSQL", () => server.stop("immediate"));
  return server;
}
