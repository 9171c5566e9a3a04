import type { Metadata } from "next";
import { deps } from "@/lib/server/deps";
import { mayUse } from "@/lib/server/may-use";
import { requireActor } from "@/lib/server/session";
import { listCrews } from "@/lib/usecases/list-crews";
import { saveCrew } from "@/lib/usecases/save-crew";
import { NoPermission } from "../../_parts/no-permission";
import { CrewsPage } from "./_parts/crews-page";

export const metadata: Metadata = { title: "Crews" };

export default async function Page() {
  const actor = await requireActor();
  if (!mayUse(listCrews, actor)) return <NoPermission title="Crews" who="the office" />;
  const view = await listCrews(deps(), actor, {});
  return <CrewsPage view={view} mayChange={mayUse(saveCrew, actor)} newId={deps().newId()} />;
}
