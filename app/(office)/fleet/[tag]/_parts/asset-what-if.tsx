import { Section } from "@/components/ui/page-head";
import { dayOfInstant } from "@/lib/present/calendar-days";
import { writtenNumber } from "@/lib/present/written-number";
import { mayUse } from "@/lib/server/may-use";
import { requireActor } from "@/lib/server/session";
import type { AssetView } from "@/lib/usecases/read-asset";
import { saveDeviceModel } from "@/lib/usecases/save-device-model";
import type { ActContext } from "./act-context";
import { WhatIf } from "./what-if";

/** "What if": the forecast beside the one that would stand if something were otherwise. */
export async function AssetWhatIf(props: { view: AssetView; context: ActContext | null }) {
  const { view, context } = props;
  const { pack, model, organisation, asset } = view;
  if (!pack) return null;
  const { locale, timeZone, currency } = organisation;
  const states = model?.states ?? [];
  const period = states.reduce((sum, state) => sum + state.durationMs, 0);
  const mayChangeModel = mayUse(saveDeviceModel, await requireActor());
  return (
    <Section title="What if" aside="changes nothing until you save an act of it">
      <WhatIf
        context={context}
        subject={{ tag: asset.tag, installedAt: pack.installedAt }}
        today={dayOfInstant(view.now, timeZone)}
        presentation={{ locale, timeZone, currency }}
        modelHref={mayChangeModel ? `/fleet/models/${asset.deviceModelId}` : null}
        periodMinutes={writtenNumber(Math.round(period / 600), 2, locale)}
        states={states.map((state) => ({
          value: state.name,
          label: `${state.name}, now ${writtenNumber(state.currentUa, 3, locale)} mA`,
        }))}
        otherCells={view.acceptedCells
          .filter((cell) => cell.id !== pack.cellTypeId)
          .map((cell) => ({ value: cell.id, label: cell.designation }))}
      />
    </Section>
  );
}
