import { Figure, FigureRow } from "@/components/ui/figure";
import { formatDay } from "@/lib/present/format-day";
import { formatPercent } from "@/lib/present/format-share";
import { formatNumber, NBSP, NOTHING } from "@/lib/present/locale";
import type { TrustView } from "@/lib/usecases/read-trust";

/** Packs watched, stops against those expected, lives against those said, surprises. */
export function TrustFigures({ view }: { view: TrustView }) {
  const { whole, organisation, since, today } = view;
  const { locale } = organisation;
  const low = Math.max(0, Math.round(whole.expected - whole.spread));
  const high = Math.round(whole.expected + whole.spread);
  const sound = whole.stopped >= low && whole.stopped <= high;
  return (
    <FigureRow>
      <Figure
        label="Packs watched"
        value={formatNumber(whole.packs, locale)}
        range={`since ${formatDay(since, locale, { today })}`}
      />
      <Figure
        label="Stopped"
        value={formatNumber(whole.stopped, locale)}
        range={`expected ${formatNumber(low, locale)}–${formatNumber(high, locale)}`}
        tone={sound ? "order" : "soon"}
      />
      <Figure
        label="Days found over days said"
        value={whole.lasted === null ? NOTHING : timesSaid(whole.lasted, locale)}
        range="median"
      />
      <Figure
        label="Surprises"
        value={formatNumber(whole.surprises, locale)}
        range="outside the 5–95 % window"
      />
      <Figure
        label="Charge left when taken out alive"
        value={whole.shareLeft === null ? NOTHING : formatPercent(whole.shareLeft, locale)}
        range="mean, by forecast"
      />
    </FigureRow>
  );
}

/** "0.94 ×": it lasted 94 days for each 100 said. */
export function timesSaid(ratio: number, locale: string): string {
  return `${formatNumber(ratio, locale, 2)}${NBSP}×`;
}
