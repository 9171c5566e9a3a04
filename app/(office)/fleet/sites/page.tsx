import type { Metadata } from "next";
import { LinkButton } from "@/components/ui/button";
import { PageHead } from "@/components/ui/page-head";
import { hrefWith } from "@/lib/present/paging";
import { deps } from "@/lib/server/deps";
import { mayUse } from "@/lib/server/may-use";
import { requireActor } from "@/lib/server/session";
import { listSites } from "@/lib/usecases/list-sites";
import { saveSite } from "@/lib/usecases/save-site";
import { type ListParams, readSiteParams } from "../_parts/fleet-params";
import { FleetTabs } from "../_parts/fleet-tabs";
import { SiteTable } from "../_parts/site-table";

export const metadata: Metadata = { title: "Sites" };

export default async function SitesPage(props: { searchParams: Promise<ListParams> }) {
  const [params, actor] = [await props.searchParams, await requireActor()];
  const view = await listSites(deps(), actor, readSiteParams(params));
  return (
    <>
      <PageHead
        title="Sites"
        lede="Where the assets stand, and how to get in."
        actions={
          <>
            <LinkButton download href={hrefWith("/api/v1/exports/sites", params, {})}>
              Export CSV
            </LinkButton>
            {mayUse(saveSite, actor) && (
              <LinkButton kind="go" href="/fleet/sites/new">
                Add a site
              </LinkButton>
            )}
          </>
        }
      />
      <FleetTabs current="sites" />
      <SiteTable view={view} params={params} />
    </>
  );
}
