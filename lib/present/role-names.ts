const ORDER = ["administrator", "dispatcher", "supervisor", "technician"];

/** "Dispatcher", "Administrator and technician": roles as they are shown, widest first. */
export function roleNames(roles: readonly string[]): string {
  const sorted = [...roles].sort((a, b) => ORDER.indexOf(a) - ORDER.indexOf(b));
  const text =
    sorted.length < 2
      ? (sorted[0] ?? "")
      : `${sorted.slice(0, -1).join(", ")} and ${sorted.at(-1)}`;
  return text.charAt(0).toUpperCase() + text.slice(1);
}
