import { readdir } from "node:fs/promises";
import { fileURLToPath, pathToFileURL } from "node:url";
import type { Database } from "./client";
import { type Kysely, type Migration, type MigrationProvider, Migrator } from "kysely";

const folder = new URL("../migrations/", pathToFileURL(fileURLToPath(import.meta.url)));

/** Kysely's own provider imports from inside its package, where test runners cannot read TypeScript. */
const provider: MigrationProvider = {
  async getMigrations() {
    const names = (await readdir(folder)).filter((name) => name.endsWith(".ts")).sort();
    const entries = await Promise.all(
      names.map(async (name): Promise<[string, Migration]> => {
        const module: Migration = await import(new URL(name, folder).href);
        return [name.slice(0, -3), module];
      }),
    );
    return Object.fromEntries(entries);
  },
};

/**
 * Brings the schema up to date, one transaction for all that is missing.
 * @returns the names of the migrations that were run
 */
export async function migrateToLatest(db: Kysely<Database>): Promise<string[]> {
  const migrator = new Migrator({ db, provider });
  const { error, results } = await migrator.migrateToLatest();
  if (error) throw error instanceof Error ? error : new Error(String(error));
  return (results ?? []).filter((r) => r.status === "Success").map((r) => r.migrationName);
}

/** Migrations the code knows and this database has not run. */
export async function pendingMigrations(db: Kysely<Database>): Promise<string[]> {
  const migrator = new Migrator({ db, provider });
  return (await migrator.getMigrations()).filter((m) => !m.executedAt).map((m) => m.name);
}
