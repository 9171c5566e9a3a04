/**
 * `npm test`: everything that is checked, on a temporary database, with a count at the end.
 * `npm test -- unit`, `-- db`, `-- e2e`, `-- lint` run a part; what follows goes to vitest.
 */
import { test } from "./process/test.mjs";

process.exitCode = await test(process.argv.slice(2));
