import { Figure, FigureRow } from "@/components/ui/figure";
import { likelyCount } from "@/lib/present/format-quantity";
import { formatPercent } from "@/lib/present/format-share";
import { formatHours } from "@/lib/present/format-time";
import { formatNumber, NOTHING } from "@/lib/present/locale";
import { MS_PER_DAY } from "@/lib/units";
import type { HorizonView } from "@/lib/usecases/read-horizon";

/** The five figures a dispatcher looks at first. */
export function HorizonFigures({ view }: { view: HorizonView }) {
  const { figures, organisation } = view;
  const { locale } = organisation;
  const { dueSoon, out, hours, cells, thrownAway } = figures;
  const [first, ...others] = cells;
  return (
    <FigureRow>
      <Figure
        label={`Reach cut-off in ${dueSoon.days} days`}
        value={formatNumber(Math.round(dueSoon.mean), locale)}
        range={likelyCount(dueSoon.low, dueSoon.high, locale)}
      />
      <Figure
        label="Out now"
        value={formatNumber(out.count, locale)}
        tone={out.count > 0 ? "out" : "order"}
        range={out.oldest && out.count > 0 ? `oldest ${daysSince(out.oldest, view.now)} d` : "none"}
      />
      <Figure
        label="Booked this week"
        value={formatHours(hours.bookedS, locale)}
        range={`of ${formatHours(hours.shiftS, locale)} on shift`}
      />
      <Figure
        label="Cells to load this week"
        value={first ? formatNumber(first.cells, locale) : "0"}
        range={
          first
            ? [first.designation, ...others.map((c) => `${c.cells} ${c.designation}`)]
                .slice(0, 3)
                .join(" · ")
            : "no round published"
        }
      />
      <Figure
        label={`Charge thrown away, last ${figures.binDays} d`}
        value={thrownAway === null ? NOTHING : formatPercent(thrownAway, locale)}
        range="of rated Ah"
      />
    </FigureRow>
  );
}

function daysSince(then: Date, now: Date): number {
  return Math.max(0, Math.floor((now.getTime() - then.getTime()) / MS_PER_DAY));
}
