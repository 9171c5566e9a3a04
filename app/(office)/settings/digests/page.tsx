import type { Metadata } from "next";
import { deps } from "@/lib/server/deps";
import { mayUse } from "@/lib/server/may-use";
import { requireActor } from "@/lib/server/session";
import { listDigestChoices } from "@/lib/usecases/list-digest-choices";
import { NoPermission } from "../../_parts/no-permission";
import { DigestsPage } from "./_parts/digests-page";

export const metadata: Metadata = { title: "Digests" };

export default async function Page() {
  const actor = await requireActor();
  if (!mayUse(listDigestChoices, actor)) return <NoPermission title="Digests" who="the office" />;
  return <DigestsPage {...await listDigestChoices(deps(), actor, {})} />;
}
