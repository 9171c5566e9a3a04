import { Figure, FigureRow } from "@/components/ui/figure";
import { formatNumber, NBSP } from "@/lib/present/locale";
import { POLICY_WORDS, pounds } from "@/lib/present/policy-comparison";
import type { PoliciesView } from "@/lib/usecases/read-policies";

/** The product beside the cheapest of the other habits. */
export function PolicyFigures({ view }: { view: PoliciesView }) {
  const { locale, comparison } = view;
  const { own, cheapestOther, saving } = comparison;
  const other = POLICY_WORDS[cheapestOther.policy].toLowerCase();
  const hours = (value: number) => `${formatNumber(value, locale, 1)}${NBSP}h`;
  return (
    <FigureRow>
      <Figure
        label="A device-year"
        value={pounds(own.pounds, locale)}
        range={`${pounds(cheapestOther.pounds, locale)} by ${other}`}
      />
      <Figure
        label={saving >= 0 ? "Cheaper than the best other" : "Dearer than the best other"}
        value={`${formatNumber(100 * Math.abs(saving), locale, 1)}${NBSP}%`}
        range={other}
        tone={saving >= 0 ? "order" : "out"}
      />
      <Figure
        label="Hours without data"
        value={hours(own.deadHours)}
        range={`${hours(cheapestOther.deadHours)} by ${other}`}
        tone={own.deadHours <= cheapestOther.deadHours ? "order" : "soon"}
      />
      <Figure
        label="Driven a device-year"
        value={`${formatNumber(own.kilometres, locale, 1)}${NBSP}km`}
        range={`${formatNumber(cheapestOther.kilometres, locale, 1)}${NBSP}km by ${other}`}
      />
    </FigureRow>
  );
}
