import { dayOfInstant } from "@/lib/present/calendar-days";
import { formatTime } from "@/lib/present/format-time";
import type { AssetView, SwapChoices } from "@/lib/usecases/read-asset";

/** What the forms of an asset need to know; plain data, as it goes to the browser. */
export interface ActContext {
  readonly assetId: string;
  readonly tag: string;
  /** Local time now, as a form writes it: 2026-12-01T09:30. */
  readonly now: string;
  readonly packId: string | null;
  readonly series: number;
  readonly parallel: number;
  readonly choices: SwapChoices;
}

/** The context of an asset's forms. */
export function actContext(view: AssetView, choices: SwapChoices): ActContext {
  const { asset, pack, organisation, now } = view;
  const day = dayOfInstant(now, organisation.timeZone);
  const clock = formatTime(now, { ...organisation, locale: "en-GB" }).slice(0, 5);
  return {
    ...{ assetId: asset.id, tag: asset.tag, now: `${day}T${clock}`, choices },
    ...{ packId: pack?.id ?? null, series: asset.series, parallel: asset.parallel },
  };
}
