import type { Metadata } from "next";
import { deps } from "@/lib/server/deps";
import { mayUse } from "@/lib/server/may-use";
import { requireActor } from "@/lib/server/session";
import { listAudit } from "@/lib/usecases/list-audit";
import { NoPermission } from "../../_parts/no-permission";
import { one, type SearchParams } from "../_parts/search-entries";
import { AuditLog } from "./_parts/audit-log";

export const metadata: Metadata = { title: "Who did what" };

export default async function Page({ searchParams }: { searchParams: SearchParams }) {
  const actor = await requireActor();
  if (!mayUse(listAudit, actor)) {
    return <NoPermission title="Who did what" who="administrators and supervisors" />;
  }
  const params = await searchParams;
  const view = await listAudit(deps(), actor, {
    page: Number(one(params, "page") ?? 1),
    act: one(params, "act"),
    personId: one(params, "person"),
    fromDay: one(params, "from"),
    toDay: one(params, "to"),
  });
  return <AuditLog view={view} />;
}
