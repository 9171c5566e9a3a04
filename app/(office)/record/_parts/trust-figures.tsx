import { Figure, FigureRow } from "@/components/ui/figure";
import { formatPercent } from "@/lib/present/format-share";
import { formatNumber, NOTHING } from "@/lib/present/locale";
import type { TrustView } from "@/lib/usecases/read-trust";

/** Removals, stopped against expected, score and surprises. */
export function TrustFigures({ view }: { view: TrustView }) {
  const { whole, organisation } = view;
  const { locale } = organisation;
  const low = Math.max(0, Math.round(whole.expected - whole.spread));
  const high = Math.round(whole.expected + whole.spread);
  const sound = whole.stopped >= low && whole.stopped <= high;
  return (
    <FigureRow>
      <Figure label="Packs that came out" value={formatNumber(whole.removals, locale)} />
      <Figure
        label="Found stopped"
        value={formatNumber(whole.stopped, locale)}
        range={`expected ${formatNumber(low, locale)}–${formatNumber(high, locale)}`}
        tone={sound ? "order" : "soon"}
      />
      <Figure
        label="Score (Brier)"
        value={whole.brier === null ? NOTHING : formatNumber(whole.brier, locale, 3)}
        range="0 is perfect, 0.25 a coin"
      />
      <Figure
        label="Surprises"
        value={formatNumber(whole.surprises, locale)}
        range="given less than 1 in 20"
      />
      <Figure
        label="Charge left at removal"
        value={whole.shareLeft === null ? NOTHING : formatPercent(whole.shareLeft, locale)}
        range="mean, by forecast"
      />
    </FigureRow>
  );
}
