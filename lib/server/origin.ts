/**
 * The address that attempts are counted under. A proxy in front appends the client it saw, so the
 * last entry is the only one a client cannot make up.
 */
export function originOf(headers: Headers): string {
  return headers.get("x-forwarded-for")?.split(",").at(-1)?.trim() || "local";
}
