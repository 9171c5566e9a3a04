/**
 * `npm run dev`: the product with reloading, on the development database.
 * `npm run dev -- database`: only the database, which stays up; tests use it too.
 */
import { develop } from "./process/develop.mjs";

process.exitCode = await develop(process.argv.slice(2));
