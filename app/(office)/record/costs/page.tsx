import type { Metadata } from "next";
import { LinkButton } from "@/components/ui/button";
import { PageHead } from "@/components/ui/page-head";
import { deps } from "@/lib/server/deps";
import { requireActor } from "@/lib/server/session";
import { readCosts } from "@/lib/usecases/read-costs";
import { CostsTable } from "../_parts/costs-table";
import { RecordTabs } from "../_parts/record-tabs";

export const metadata: Metadata = { title: "Costs" };

export default async function CostsPage() {
  const view = await readCosts(deps(), await requireActor(), { days: 730 });
  return (
    <>
      <PageHead
        title="What swapping cost"
        lede="By month: packs that came out and why, silence, cells, crew and driving of the rounds that were done."
        actions={
          <LinkButton href="/api/v1/exports/costs" download>
            Export CSV
          </LinkButton>
        }
      />
      <RecordTabs current="costs" />
      <CostsTable view={view} />
    </>
  );
}
