import { findOrganisation } from "@/db/queries/organisation";
import { deps } from "./deps";
import { log } from "./log";

const FRESH_MS = 30_000;
const holder = globalThis as { wanewrightTiles?: { origin: string | null; until: number } };

/** The origin of the organisation's map tiles, read at most twice a minute. */
export async function tileOrigin(): Promise<string | null> {
  const known = holder.wanewrightTiles;
  const now = performance.now();
  if (known && known.until > now) return known.origin;
  const origin = await readOrigin();
  holder.wanewrightTiles = { origin, until: now + FRESH_MS };
  return origin;
}

/** Reads it anew next time, in this process; others follow within half a minute. */
export function forgetTileOrigin(): void {
  delete holder.wanewrightTiles;
}

async function readOrigin(): Promise<string | null> {
  try {
    return originOfTemplate((await findOrganisation(deps().db))?.mapTileUrl ?? null);
  } catch (error) {
    log.warn({ act: "tile-origin", error }, "the map tiles' address cannot be read");
    return null;
  }
}

/** "https://{s}.tiles.example/{z}/{x}/{y}.png" gives "https://*.tiles.example". */
export function originOfTemplate(template: string | null): string | null {
  const match = /^(https?):\/\/(\{s\}\.)?([a-z0-9.-]+(?::\d+)?)(?:\/|$)/i.exec(template ?? "");
  return match ? `${match[1]}://${match[2] ? "*." : ""}${match[3]}` : null;
}
