import type { Metadata } from "next";
import { deps } from "@/lib/server/deps";
import { mayUse } from "@/lib/server/may-use";
import { requireActor } from "@/lib/server/session";
import { listClimates } from "@/lib/usecases/list-climates";
import { saveClimate } from "@/lib/usecases/save-climate";
import { NoPermission } from "../../_parts/no-permission";
import { ClimatesPage } from "./_parts/climates-page";

export const metadata: Metadata = { title: "Climates" };

export default async function Page() {
  const actor = await requireActor();
  if (!mayUse(listClimates, actor)) return <NoPermission title="Climates" who="the office" />;
  const view = await listClimates(deps(), actor, {});
  const mayChange = mayUse(saveClimate, actor);
  return <ClimatesPage {...view} mayChange={mayChange} newId={deps().newId()} />;
}
