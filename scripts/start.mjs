/**
 * `npm start`: everything that this machine lacks, then the database, the web and worker
 * processes and the mail page. Written for bare Node: it runs before `npm ci` ever has.
 */
import { start } from "./process/start.mjs";

process.exitCode = await start();
