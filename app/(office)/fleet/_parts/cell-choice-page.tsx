import { Caution } from "@/components/ui/notice";
import { PageHead } from "@/components/ui/page-head";
import { averageUa, peakUa } from "@/lib/present/duty-cycle";
import { formatCurrent, formatTemperature, formatVolts } from "@/lib/present/format-quantity";
import { deps } from "@/lib/server/deps";
import { orNotFound } from "@/lib/server/or-not-found";
import { requireActor } from "@/lib/server/session";
import { type CellComparison, compareCells } from "@/lib/usecases/compare-cells";
import { CellChoiceTable } from "./cell-choice-table";
import { CellMisfits } from "./cell-misfits";

/** Every cell type side by side, for an asset or for a device model. */
export async function CellChoicePage({ of }: { of: { tag: string } | { modelId: string } }) {
  const actor = await requireActor();
  const view = await orNotFound(() => compareCells(deps(), actor, of));
  const { tag, model } = view.subject;
  return (
    <>
      <PageHead
        crumb={
          tag
            ? { label: tag, href: `/fleet/${encodeURIComponent(tag)}` }
            : { label: model.name, href: `/fleet/models/${model.id}` }
        }
        title="Which cell?"
        lede={ledeOf(view)}
      />
      <CellChoiceTable view={view} />
      <CellMisfits view={view} />
      <Caution title="Before other cells go in">
        What fits by these figures must still be allowed by the maker of the device: polarity,
        contacts, venting, and approvals for explosive atmospheres hang on the cell.
      </Caution>
    </>
  );
}

function ledeOf({ subject, device, organisation }: CellComparison): string {
  const { locale } = organisation;
  const { model, place } = subject;
  const measured = device.measuredDraw;
  const draw = measured
    ? `measured draw ${formatCurrent(measured.averageUa, locale)}`
    : `${formatCurrent(averageUa(device.duty), locale)} on average`;
  const coldest = Math.min(...device.monthlyMeanDc);
  return [
    model.name,
    `${model.series} in series${model.parallel > 1 ? `, ${model.parallel} beside each other` : ""}`,
    `stops at ${formatVolts(model.cutoffMv, locale)}`,
    `${draw}, ${formatCurrent(peakUa(device.duty), locale)} at the peak`,
    `${place?.climateName ?? "a temperate year"}, coldest month ${formatTemperature(coldest, locale)}`,
  ].join(" · ");
}
