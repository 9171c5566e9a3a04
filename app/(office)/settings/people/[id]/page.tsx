import type { Metadata } from "next";
import { deps } from "@/lib/server/deps";
import { mayUse } from "@/lib/server/may-use";
import { orNotFound } from "@/lib/server/or-not-found";
import { requireActor } from "@/lib/server/session";
import { readPerson } from "@/lib/usecases/read-person";
import { NoPermission } from "../../../_parts/no-permission";
import { PersonPage } from "./_parts/person-page";

export const metadata: Metadata = { title: "Person" };

export default async function Page({ params }: { params: Promise<{ id: string }> }) {
  const actor = await requireActor();
  if (!mayUse(readPerson, actor)) return <NoPermission title="People" who="administrators" />;
  const { id } = await params;
  const person = await orNotFound(() => readPerson(deps(), actor, { personId: id }));
  return <PersonPage person={person} isSelf={person.id === actor.personId} />;
}
