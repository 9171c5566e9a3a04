import type { Metadata } from "next";
import { LinkButton } from "@/components/ui/button";
import { PageHead } from "@/components/ui/page-head";
import { deps } from "@/lib/server/deps";
import { requireActor } from "@/lib/server/session";
import { readDemand } from "@/lib/usecases/read-demand";
import { DemandTable } from "../_parts/demand-table";
import { OrderTable } from "../_parts/order-table";
import { StoresTabs } from "../_parts/stores-tabs";

export const metadata: Metadata = { title: "Demand" };

export default async function DemandPage() {
  const view = await readDemand(deps(), await requireActor(), { months: 6 });
  return (
    <>
      <PageHead
        title="Demand"
        lede="Cells that packs will ask for as they reach cut-off, and what to order by when."
        actions={
          <LinkButton download href="/api/v1/exports/demand">
            Export CSV
          </LinkButton>
        }
      />
      <StoresTabs current="demand" />
      <OrderTable view={view} />
      <DemandTable view={view} />
    </>
  );
}
