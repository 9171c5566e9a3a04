import type { Metadata } from "next";
import { LinkButton } from "@/components/ui/button";
import { PageHead } from "@/components/ui/page-head";
import { hrefWith } from "@/lib/present/paging";
import { deps } from "@/lib/server/deps";
import { mayUse } from "@/lib/server/may-use";
import { requireActor } from "@/lib/server/session";
import { listAssets } from "@/lib/usecases/list-assets";
import { saveAsset } from "@/lib/usecases/save-asset";
import { FleetFilters } from "./_parts/fleet-filters";
import { type ListParams, readAssetParams } from "./_parts/fleet-params";
import { FleetTable } from "./_parts/fleet-table";
import { FleetTabs } from "./_parts/fleet-tabs";

export const metadata: Metadata = { title: "Fleet" };

export default async function FleetPage(props: { searchParams: Promise<ListParams> }) {
  const [params, actor] = [await props.searchParams, await requireActor()];
  const view = await listAssets(deps(), actor, readAssetParams(params));
  return (
    <>
      <PageHead
        title="Fleet"
        lede="Every asset, its pack and what is known about it."
        actions={
          <>
            <LinkButton download href={hrefWith("/api/v1/exports/assets", params, {})}>
              Export CSV
            </LinkButton>
            {mayUse(saveAsset, actor) && (
              <LinkButton {...{ kind: "go", href: "/fleet/new" }}>Add an asset</LinkButton>
            )}
          </>
        }
      />
      <FleetTabs current="assets" />
      <FleetFilters view={view} params={params} />
      <FleetTable view={view} params={params} />
    </>
  );
}
