import { forgetPerson, openFieldDatabase } from "./database";
import { forgetShell } from "./shell";

/**
 * Takes the day and the pages off this phone after a sign-out. What is still to be sent stays.
 * @returns how many entries and photos stay; 0 where nothing was ever kept
 */
export async function leavePhone(): Promise<number> {
  await forgetShell();
  if (!(await everKept())) return 0;
  const db = await openFieldDatabase();
  await forgetPerson(db);
  const entries = await db.getAll("entries");
  const kept = entries.filter((entry) => entry.state !== "applied").length;
  const photos = await db.count("photos");
  db.close();
  return kept + photos;
}

/** An office computer has no store, and asking must not make one. */
async function everKept(): Promise<boolean> {
  if (typeof indexedDB.databases !== "function") return true;
  const known = await indexedDB.databases();
  return known.some(({ name }) => name === "wanewright-field");
}
