import type { Metadata } from "next";
import { deps } from "@/lib/server/deps";
import { orNotFound } from "@/lib/server/or-not-found";
import { mayUse } from "@/lib/server/may-use";
import { requireActor } from "@/lib/server/session";
import { readAsset, readSwapChoices } from "@/lib/usecases/read-asset";
import { AssetActs } from "./_parts/asset-acts";
import { AssetHead } from "./_parts/asset-head";
import { AssetHistory } from "./_parts/asset-history-table";
import { AssetPack } from "./_parts/asset-pack";
import { AssetPhotos } from "./_parts/asset-photos";
import { AssetVoltages } from "./_parts/asset-voltage-table";

interface Props {
  params: Promise<{ tag: string }>;
}

export async function generateMetadata(props: Props): Promise<Metadata> {
  return { title: decodeURIComponent((await props.params).tag) };
}

export default async function AssetPage(props: Props) {
  const tag = decodeURIComponent((await props.params).tag);
  const actor = await requireActor();
  const view = await orNotFound(() => readAsset(deps(), actor, { tag }));
  const choices = mayUse(readSwapChoices, actor)
    ? await readSwapChoices(deps(), actor, { tag })
    : null;
  return (
    <>
      <AssetHead view={view} acts={choices && <AssetActs view={view} choices={choices} />} />
      <AssetPack view={view} />
      <AssetVoltages view={view} mayJudge={choices !== null} />
      <AssetPhotos view={view} />
      <AssetHistory view={view} />
    </>
  );
}
