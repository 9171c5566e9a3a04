import type { Metadata } from "next";
import { PageHead } from "@/components/ui/page-head";
import { deps } from "@/lib/server/deps";
import { mayUse } from "@/lib/server/may-use";
import { requireActor } from "@/lib/server/session";
import { dismissFinding } from "@/lib/usecases/dismiss-finding";
import { listFindings } from "@/lib/usecases/list-findings";
import { RecordTabs } from "../_parts/record-tabs";
import { FindingList } from "./_parts/finding-list";

export const metadata: Metadata = { title: "Findings" };

export default async function FindingsPage() {
  const actor = await requireActor();
  const view = await listFindings(deps(), actor, {});
  return (
    <>
      <PageHead
        title="Findings"
        lede="Each night the whole fleet is looked over for lots that die early and for device models whose draw changed."
      />
      <RecordTabs current="findings" />
      <FindingList view={view} maySettle={mayUse(dismissFinding, actor)} />
    </>
  );
}
