import type { Metadata } from "next";
import { LinkButton } from "@/components/ui/button";
import { PageHead } from "@/components/ui/page-head";
import { dayOfInstant } from "@/lib/present/calendar-days";
import { deps } from "@/lib/server/deps";
import { mayUse } from "@/lib/server/may-use";
import { requireActor } from "@/lib/server/session";
import { listLotsInStores } from "@/lib/usecases/read-stores";
import { receiveLot } from "@/lib/usecases/receive-lot";
import { readLotParams } from "../_parts/lot-params";
import { LotTable } from "../_parts/lot-table";
import { ReceiveDialog } from "../_parts/receive-dialog";
import { StoresTabs } from "../_parts/stores-tabs";

export const metadata: Metadata = { title: "Lots" };
type Search = Promise<Record<string, string | undefined>>;

export default async function LotsPage(props: { searchParams: Search }) {
  const [params, actor] = [await props.searchParams, await requireActor()];
  const view = await listLotsInStores(deps(), actor, readLotParams(params));
  const mayChange = mayUse(receiveLot, actor);
  const today = dayOfInstant(view.now, view.organisation.timeZone);
  return (
    <>
      <PageHead
        title="Lots"
        lede="Deliveries of cells, what is left of them, and where it lies."
        actions={
          <>
            <LinkButton download href="/api/v1/exports/lots">
              Export CSV
            </LinkButton>
            {mayChange && <ReceiveDialog view={view} today={today} />}
          </>
        }
      />
      <StoresTabs current="lots" />
      <LotTable view={view} params={params} mayChange={mayChange} />
    </>
  );
}
