import type { Metadata } from "next";
import { PageHead } from "@/components/ui/page-head";
import { deps } from "@/lib/server/deps";
import { requireActor } from "@/lib/server/session";
import { readPolicies } from "@/lib/usecases/read-policies";
import { RecordTabs } from "../_parts/record-tabs";
import { PolicyBars, PolicyCosts } from "./_parts/policy-bars";
import { PolicyFigures } from "./_parts/policy-figures";
import { PolicyMethod } from "./_parts/policy-method";
import { PolicyTable } from "./_parts/policy-table";

export const metadata: Metadata = { title: "Policies" };

export default async function PoliciesPage() {
  const view = await readPolicies(deps(), await requireActor(), {});
  return (
    <>
      <PageHead
        title="What other habits would cost"
        lede="The demonstration's fleet, lived through in a simulator under four ways to decide when a pack is swapped. These are simulated years, not yours: what yours cost stands under Costs."
      />
      <RecordTabs current="policies" />
      <PolicyFigures view={view} />
      <PolicyCosts measure={view.comparison.costs} />
      <div className="grid grid-cols-[minmax(0,1fr)] gap-x-6 md:grid-cols-2">
        {view.comparison.measures.map((measure) => (
          <PolicyBars key={measure.title} measure={measure} />
        ))}
      </div>
      <PolicyTable view={view} />
      <PolicyMethod view={view} />
    </>
  );
}
