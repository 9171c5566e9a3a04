import { PageHead } from "@/components/ui/page-head";
import { writtenMoney } from "@/lib/present/written-number";
import { deps } from "@/lib/server/deps";
import { orNotFound } from "@/lib/server/or-not-found";
import { requireActor } from "@/lib/server/session";
import { readOrganisation } from "@/lib/usecases/read-organisation";
import { readAssetForm } from "@/lib/usecases/save-asset";
import { AssetForm } from "./asset-form";

/** The form of a known asset, or of a new one when `tag` is null. */
export async function AssetFormPage({ tag }: { tag: string | null }) {
  const actor = await requireActor();
  const view = await orNotFound(() => readAssetForm(deps(), actor, { tag }));
  const { currency, locale } = await readOrganisation(deps(), actor, {});
  const { asset } = view;
  return (
    <>
      <PageHead
        crumb={{ label: "Fleet", href: "/fleet" }}
        tag={asset?.tag}
        title={asset ? "Edit the asset" : "Add an asset"}
      />
      <AssetForm
        id={asset?.id ?? deps().newId()}
        stored={
          asset && {
            ...asset,
            silenceCost: writtenMoney(asset.silenceCostMinorPerHour, locale),
          }
        }
        sites={view.sites}
        models={view.models.map(({ id, name }) => ({ id, name }))}
        currency={currency}
      />
    </>
  );
}
