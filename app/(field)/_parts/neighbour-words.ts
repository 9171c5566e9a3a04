import { formatDay } from "@/lib/present/format-day";
import { formatMoney } from "@/lib/present/format-quantity";
import { dayOfInstant } from "@/lib/present/calendar-days";
import type { WaneDiscModel } from "@/lib/present/wane-disc";
import type { DayAsset, DayPack } from "@/lib/sync/day-pack";
import { isFresh } from "./day-view";

/** Whether a neighbour is worth swapping while there, from the forecast that came with the day. */
export function neighbourWords(day: DayPack, asset: DayAsset, disc: WaneDiscModel): string {
  if (isFresh(day, asset.pack)) return "fresh cells";
  const left = disc.state === "lit" && asset.pack?.forecast ? `${disc.label} left` : disc.label;
  const { worth } = asset;
  if (!worth) return disc.tone === "out" ? `${left}: swap it while you are here` : left;
  const saves = worth.savesMinor;
  const money = formatMoney(Math.abs(saves), day.organisation, { whole: true });
  if (worth.standing === "due") return `${left}: swap it now, waiting costs about ${money}`;
  if (worth.standing === "near") return `${left}: worth it while here, saves about ${money}`;
  const { locale, timeZone } = day.organisation;
  const today = dayOfInstant(new Date(day.madeAt), timeZone);
  return `${left}: can wait, best about ${formatDay(worth.laterDay, locale, { today })}`;
}
