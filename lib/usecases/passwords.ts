import { hash, verify } from "@node-rs/argon2";

/**
 * Argon2id (what the library makes unless told) with 19 MiB, 2 passes, 1 lane: the first choice of the OWASP Password Storage
 * Cheat Sheet. Parameters stand in each hash, so raising them here leaves old ones readable.
 */
const SETTINGS = {
  memoryCost: 19_456,
  timeCost: 2,
  parallelism: 1,
};

/** @returns the hash in PHC string format */
export function hashPassword(password: string): Promise<string> {
  return hash(password.normalize("NFKC"), SETTINGS);
}

let decoy: Promise<string> | null = null;

/**
 * Checks a password. Without a hash (nobody of that mail, no password set, switched off) it
 * works as long on a decoy, so that the time taken does not tell who has an account.
 */
export async function passwordMatches(stored: string | null, password: string): Promise<boolean> {
  decoy ??= hashPassword("nobody has this password");
  const matches = await verify(stored ?? (await decoy), password.normalize("NFKC"));
  return stored !== null && matches;
}
