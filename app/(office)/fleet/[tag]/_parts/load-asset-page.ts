import { deps } from "@/lib/server/deps";
import { mayUse } from "@/lib/server/may-use";
import { orNotFound } from "@/lib/server/or-not-found";
import { requireActor } from "@/lib/server/session";
import { explainForecast } from "@/lib/usecases/explain-forecast";
import { listAssetFindings } from "@/lib/usecases/list-findings";
import { readAsset, readSwapChoices } from "@/lib/usecases/read-asset";

/** Everything an asset's page shows; `choices` is null for those who may only look. */
export async function loadAssetPage(tag: string) {
  const actor = await requireActor();
  const view = await orNotFound(() => readAsset(deps(), actor, { tag }));
  const [choices, explanation, findings] = await Promise.all([
    mayUse(readSwapChoices, actor) ? readSwapChoices(deps(), actor, { tag }) : null,
    explainForecast(deps(), actor, { tag }),
    listAssetFindings(deps(), actor, { assetId: view.asset.id }),
  ]);
  return { view, choices, explanation, findings };
}
