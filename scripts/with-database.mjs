/**
 * Runs a script on the database of this checkout: the one that DATABASE_URL names, or the one
 * that `npm start` has running. `node scripts/with-database.mjs scripts/migrate.ts --check`
 */
import { runWithDatabase } from "./process/with-database.mjs";

process.exitCode = await runWithDatabase(process.argv.slice(2));
