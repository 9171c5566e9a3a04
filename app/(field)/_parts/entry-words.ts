import { formatInstant } from "@/lib/present/format-time";
import { formatVolts } from "@/lib/present/format-quantity";
import { findAsset, findStop } from "@/lib/offline/day";
import type { DayPack } from "@/lib/sync/day-pack";
import type { OutboxEntry } from "@/lib/sync/outbox";
import { stopTitle } from "./day-view";
import { CANNOT_WORDS } from "./field-words";

/** What an entry says: "QF-0981: 3.48 V resting". */
export function entryTitle({ body }: OutboxEntry, day: DayPack | null): string {
  const locale = day?.organisation.locale ?? "en-GB";
  const tag = (assetId: string) => (day && findAsset(day, assetId)?.tag) ?? "Asset";
  const stop = (stopId: string) => {
    const found = day && findStop(day, stopId);
    return found ? stopTitle(day, found) : "Stop";
  };
  switch (body.kind) {
    case "reading": {
      const mode = body.mode === "loaded" ? "under load" : "resting";
      return `${tag(body.assetId)}: ${formatVolts(body.millivolts, locale)} ${mode}`;
    }
    case "swap":
      return `${tag(body.assetId)}: pack swapped`;
    case "cannot":
      return `${stop(body.stopId)}: ${CANNOT_WORDS[body.reason].toLowerCase()}`;
    case "stop-done":
      return `${stop(body.stopId)}: done`;
    case "note":
      return `${stop(body.stopId)}: ${body.text ? `“${body.text.slice(0, 40)}”` : "photo"}`;
    case "load-check":
      return body.stopsShort.length > 0 ? "Load checked: short" : "Load checked";
    case "reorder":
      return "Order of the stops changed";
    case "round":
      return body.act === "done" ? "Round finished" : "Round started";
  }
}

export function entryWhen({ happenedAt }: OutboxEntry, day: DayPack | null): string {
  const at = new Date(happenedAt);
  return day ? formatInstant(at, day.organisation, { year: false }) : at.toISOString().slice(0, 16);
}

export function stateWords({ state, attempts }: OutboxEntry, held: boolean): string {
  if (held) return "waits for the swap before it";
  switch (state) {
    case "kept":
      return attempts > 0 ? "kept, to be sent again" : "kept, to be sent";
    case "sending":
      return "being sent";
    case "applied":
      return "sent";
    case "refused":
      return "refused";
  }
}
