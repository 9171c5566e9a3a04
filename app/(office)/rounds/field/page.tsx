import type { Metadata } from "next";
import { PageHead } from "@/components/ui/page-head";
import { deps } from "@/lib/server/deps";
import { mayUse } from "@/lib/server/may-use";
import { requireActor } from "@/lib/server/session";
import { closeMatter } from "@/lib/usecases/close-matter";
import { listFieldMatters } from "@/lib/usecases/list-field-matters";
import { ClosedMatters } from "./_parts/closed-matters";
import { MatterList } from "./_parts/matter-list";

export const metadata: Metadata = { title: "From the field" };

export default async function FromTheFieldPage() {
  const actor = await requireActor();
  const matters = await listFieldMatters(deps(), actor, {});
  return (
    <>
      <PageHead
        title="From the field"
        crumb={{ label: "Rounds", href: "/rounds" }}
        lede="What came from the phones and needs a decision here: refused entries, conflicts, shortages, stops that could not be done."
      />
      <MatterList matters={matters} mayDecide={mayUse(closeMatter, actor)} />
      <ClosedMatters matters={matters} />
    </>
  );
}
