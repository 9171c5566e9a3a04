import { LinkButton } from "@/components/ui/button";
import { PageHead } from "@/components/ui/page-head";
import { writtenMoney, writtenNumber } from "@/lib/present/written-number";
import { deps } from "@/lib/server/deps";
import { mayUse } from "@/lib/server/may-use";
import { orNotFound } from "@/lib/server/or-not-found";
import { requireActor } from "@/lib/server/session";
import { readDeviceModelForm, saveDeviceModel } from "@/lib/usecases/save-device-model";
import { ModelForm } from "./model-form";

/** The form of a known device model, or of a new one when `id` is null. */
export async function ModelFormPage({ id }: { id: string | null }) {
  const actor = await requireActor();
  const view = await orNotFound(() => readDeviceModelForm(deps(), actor, { id }));
  const { model, organisation } = view;
  const { locale, currency } = organisation;
  const write = (value: number, digits: number) => writtenNumber(value, digits, locale);
  return (
    <>
      <PageHead
        crumb={{ label: "Device models", href: "/fleet/models" }}
        title={model?.name ?? "Add a device model"}
        actions={
          model && <LinkButton href={`/fleet/models/${model.id}/cells`}>Which cell?</LinkButton>
        }
      />
      <ModelForm
        id={model?.id ?? deps().newId()}
        mayChange={mayUse(saveDeviceModel, actor)}
        {...{ locale, currency, cellTypes: view.cellTypes }}
        stored={
          model && {
            ...model,
            cutoff: write(model.cutoffMv, 3),
            silenceCost: writtenMoney(model.silenceCostMinorPerHour, locale),
            states: model.states.map((s) => ({
              name: s.name,
              current: write(s.currentUa, 3),
              seconds: write(s.durationMs, 3),
            })),
          }
        }
      />
    </>
  );
}
