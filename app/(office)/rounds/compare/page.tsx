import type { Metadata } from "next";
import { notFound } from "next/navigation";
import { z } from "zod";
import { PageHead } from "@/components/ui/page-head";
import { deps } from "@/lib/server/deps";
import { requireActor } from "@/lib/server/session";
import { comparePlans } from "@/lib/usecases/compare-plans";
import { ComparedTables } from "./_parts/compared-tables";

export const metadata: Metadata = { title: "Two plans" };

const plansNamed = z.object({ plan: z.uuid(), with: z.uuid() });

export default async function ComparePage(props: { searchParams: Promise<unknown> }) {
  const actor = await requireActor();
  const named = plansNamed.safeParse(await props.searchParams);
  if (!named.success) notFound();
  const view = await comparePlans(deps(), actor, {
    planId: named.data.plan,
    otherId: named.data.with,
  });
  const [plan] = view.plans;
  return (
    <>
      <PageHead
        crumb={{ label: "Rounds", href: `/rounds?week=${plan.firstDay}&plan=${plan.id}` }}
        title="Two plans side by side"
        lede={view.words}
      />
      <ComparedTables view={view} />
    </>
  );
}
