/**
 * Text that every store can hold. PostgreSQL takes no NUL character, and no UTF-8 store takes
 * half of a surrogate pair.
 */
export function cleanText(typed: string): string {
  return typed.replaceAll("\u0000", "").replace(/\p{Surrogate}/gu, "\ufffd");
}
