import type { Metadata } from "next";
import { deps } from "@/lib/server/deps";
import { mayUse } from "@/lib/server/may-use";
import { requireActor } from "@/lib/server/session";
import { listApiKeys } from "@/lib/usecases/list-api-keys";
import { readOrganisation } from "@/lib/usecases/read-organisation";
import { NoPermission } from "../../_parts/no-permission";
import { ApiKeysPage } from "./_parts/api-keys-page";

export const metadata: Metadata = { title: "API keys" };

export default async function Page() {
  const actor = await requireActor();
  if (!mayUse(listApiKeys, actor)) return <NoPermission title="API keys" who="administrators" />;
  const keys = await listApiKeys(deps(), actor, {});
  return <ApiKeysPage keys={keys} organisation={await readOrganisation(deps(), actor, {})} />;
}
