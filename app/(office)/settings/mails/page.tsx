import type { Metadata } from "next";
import { deps } from "@/lib/server/deps";
import { mayUse } from "@/lib/server/may-use";
import { requireActor } from "@/lib/server/session";
import { listMails } from "@/lib/usecases/list-mails";
import { NoPermission } from "../../_parts/no-permission";
import { one, type SearchParams } from "../_parts/search-entries";
import { MailLog } from "./_parts/mail-log";

export const metadata: Metadata = { title: "Mails" };

export default async function Page({ searchParams }: { searchParams: SearchParams }) {
  const actor = await requireActor();
  if (!mayUse(listMails, actor)) return <NoPermission title="Mails" who="administrators" />;
  const params = await searchParams;
  const view = await listMails(deps(), actor, {
    search: one(params, "search") ?? "",
    state: one(params, "state") as never,
    descending: true,
    page: Number(one(params, "page") ?? 1),
  });
  return <MailLog view={view} />;
}
