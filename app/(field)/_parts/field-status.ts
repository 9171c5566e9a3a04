import type { FieldSnapshot } from "@/lib/offline/field-store";

/** Signal and outbox in words, for the bar: "no signal · 3 entries kept". */
export function fieldStatus({ signal, count, busy, signedOut }: FieldSnapshot): string {
  const parts: string[] = [];
  if (signedOut) parts.push("signed out");
  else if (!signal) parts.push("no signal");
  const kept = count.toSend + count.others;
  if (kept > 0) parts.push(`${kept} ${kept === 1 ? "entry" : "entries"} kept`);
  if (count.photos > 0) parts.push(`${count.photos} ${count.photos === 1 ? "photo" : "photos"}`);
  if (count.refused > 0) parts.push(`${count.refused} refused`);
  if (parts.length > 0) return parts.join(" · ");
  return busy ? "calling…" : "all sent";
}
