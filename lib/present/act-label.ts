/** An act of the audit as words: "sign-in-with-password" is "Sign in with password". */
export function actLabel(act: string): string {
  const words = act.replace(/^sign-(in|out)/, "sign $1").replaceAll("-", " ");
  return words.charAt(0).toUpperCase() + words.slice(1);
}

/** What an audit entry tells besides, on one line: "roles: dispatcher; name: North". */
export function detailLine(detail: unknown): string {
  if (typeof detail !== "object" || detail === null) return "";
  return Object.entries(detail)
    .map(([key, value]) => `${words(key)}: ${plain(value)}`)
    .join("; ");
}

function words(key: string): string {
  return key
    .replaceAll("_", " ")
    .replace(
      /([a-z])([A-Z])/g,
      (_, before: string, after: string) => `${before} ${after.toLowerCase()}`,
    );
}

function plain(value: unknown): string {
  if (value === null || value === "") return "—";
  if (Array.isArray(value)) return value.map(plain).join(", ");
  if (typeof value === "object") {
    return `{${Object.entries(value)
      .map(([key, inner]) => `${words(key)} ${plain(inner)}`)
      .join(", ")}}`;
  }
  return String(value);
}
