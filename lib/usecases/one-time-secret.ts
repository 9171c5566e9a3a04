import { createHash } from "node:crypto";
import type { Deps } from "./use-case";

/** A secret of two random UUIDs (244 random bits) as 64 hexadecimal digits. */
export function newSecret(deps: Pick<Deps, "newId">): string {
  return `${deps.newId()}${deps.newId()}`.replaceAll("-", "");
}

/** What is stored of a secret. Its entropy makes a plain SHA-256 enough. */
export function hashOfSecret(secret: string): string {
  return createHash("sha256").update(secret).digest("hex");
}
