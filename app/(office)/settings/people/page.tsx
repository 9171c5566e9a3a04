import type { Metadata } from "next";
import { deps } from "@/lib/server/deps";
import { mayUse } from "@/lib/server/may-use";
import { requireActor } from "@/lib/server/session";
import { listPeople } from "@/lib/usecases/list-people";
import { NoPermission } from "../../_parts/no-permission";
import { one, type SearchParams } from "../_parts/search-entries";
import { PeopleList } from "./_parts/people-list";

export const metadata: Metadata = { title: "People" };

export default async function PeoplePage({ searchParams }: { searchParams: SearchParams }) {
  const actor = await requireActor();
  if (!mayUse(listPeople, actor)) return <NoPermission title="People" who="administrators" />;
  const params = await searchParams;
  const view = await listPeople(deps(), actor, {
    search: one(params, "search") ?? "",
    role: one(params, "role") as never,
    state: one(params, "state") as never,
    order: one(params, "order") as never,
    descending: one(params, "down") === "1",
    page: Number(one(params, "page") ?? 1),
  });
  return <PeopleList view={view} />;
}
