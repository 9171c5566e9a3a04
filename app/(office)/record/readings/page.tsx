import type { Metadata } from "next";
import { LinkButton } from "@/components/ui/button";
import { PageHead } from "@/components/ui/page-head";
import { deps } from "@/lib/server/deps";
import { mayUse } from "@/lib/server/may-use";
import { requireActor } from "@/lib/server/session";
import { giveVerdict } from "@/lib/usecases/give-verdict";
import { listReadingsInDoubt } from "@/lib/usecases/list-readings-in-doubt";
import { RecordTabs } from "../_parts/record-tabs";
import { DoubtTable } from "./_parts/doubt-table";

export const metadata: Metadata = { title: "Readings in doubt" };

export default async function ReadingsInDoubtPage() {
  const actor = await requireActor();
  const view = await listReadingsInDoubt(deps(), actor, {});
  return (
    <>
      <PageHead
        title="Readings in doubt"
        lede="Voltages of packs in service that the forecast hardly counts. None is thrown away: confirm it, correct it or set it aside. The original stays, and the forecast follows."
        actions={
          <LinkButton href="/api/v1/exports/readings-in-doubt" download>
            Export CSV
          </LinkButton>
        }
      />
      <RecordTabs current="readings" />
      <DoubtTable view={view} mayJudge={mayUse(giveVerdict, actor)} />
    </>
  );
}
