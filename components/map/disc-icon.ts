import { toneFill, toneStroke } from "@/components/charts/tone-class";
import type { WaneDiscModel } from "@/lib/present/wane-disc";

/** The wane disc as markup for a map marker; the same model as the component draws. */
export function discMarkup(model: WaneDiscModel, size: number): string {
  const lit = model.litPath ? `<path d="${model.litPath}" class="${toneFill[model.tone]}"/>` : "";
  const cross =
    model.state === "out"
      ? `<path d="M-5-5L5 5M5-5L-5 5" class="${toneStroke[model.tone]}" stroke-width="2"/>`
      : "";
  return `<svg viewBox="-12 -12 24 24" width="${size}" height="${size}" aria-hidden="true"><circle r="10.75" class="fill-sheet ${toneStroke[model.tone]}" stroke-width="1.5"/>${lit}${cross}</svg>`;
}

/** A numbered stop of a round; the chosen one is larger and inverted, with a ring. */
export function stopMarkup(number: number, chosen: boolean): string {
  const look = chosen
    ? "size-7.5 border-3 border-dusk bg-sheet text-sm text-dusk-ink"
    : "size-6 border-2 border-sheet bg-dusk text-xs text-on-dusk";
  return `<span class="flex items-center justify-center rounded-full font-cond font-semibold ${look}">${number}</span>`;
}

/** A stop of a round that is not the chosen one. */
export const dotMarkup =
  '<span class="block size-3 rounded-full border-2 border-dusk bg-sheet"></span>';

/** Several packs in one place, too close to tell apart at this scale. */
export function clusterMarkup(count: number): string {
  return `<span class="flex size-7 items-center justify-center rounded-full border border-ink bg-sheet font-cond text-xs font-semibold text-ink">${count}</span>`;
}

export const depotMarkup = '<span class="block size-4 border-2 border-sheet bg-ink"></span>';
