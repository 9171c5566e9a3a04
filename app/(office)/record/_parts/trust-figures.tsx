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
        label="Likely date was off by"
        value={whole.daysOff === null ? NOTHING : daysOff(whole.daysOff, locale)}
        range="median of those that stopped"
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

/** "12 d late": the likely date lay twelve days after the true one. */
export function daysOff(days: number, locale: string): string {
  const whole = Math.round(Math.abs(days));
  if (whole === 0) return "0 d";
  return `${formatNumber(whole, locale)} d ${days > 0 ? "late" : "early"}`;
}
