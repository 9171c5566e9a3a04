import type { Metadata } from "next";
import { actContext } from "./_parts/act-context";
import { AssetActs } from "./_parts/asset-acts";
import { AssetFindingNotices } from "./_parts/asset-findings";
import { AssetHead } from "./_parts/asset-head";
import { AssetHistory } from "./_parts/asset-history-table";
import { AssetPack } from "./_parts/asset-pack";
import { AssetPhotos } from "./_parts/asset-photos";
import { AssetVoltages } from "./_parts/asset-voltage-table";
import { AssetWhatIf } from "./_parts/asset-what-if";
import { loadAssetPage } from "./_parts/load-asset-page";

interface Props {
  params: Promise<{ tag: string }>;
}

export async function generateMetadata(props: Props): Promise<Metadata> {
  return { title: decodeURIComponent((await props.params).tag) };
}

export default async function AssetPage(props: Props) {
  const tag = decodeURIComponent((await props.params).tag);
  const { view, choices, explanation, findings } = await loadAssetPage(tag);
  const context = choices && actContext(view, choices);
  return (
    <>
      <AssetHead view={view} acts={context && <AssetActs view={view} context={context} />} />
      <AssetFindingNotices view={view} findings={findings} />
      <AssetPack view={view} explanation={explanation} />
      <AssetWhatIf view={view} context={context} />
      <AssetVoltages view={view} moved={explanation?.movedByReading ?? {}} mayJudge={!!choices} />
      <AssetPhotos view={view} />
      <AssetHistory view={view} />
    </>
  );
}
