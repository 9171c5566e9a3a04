import type { Metadata } from "next";
import { PageHead } from "@/components/ui/page-head";
import { deps } from "@/lib/server/deps";
import { requireActor } from "@/lib/server/session";
import { readTrust } from "@/lib/usecases/read-trust";
import { RecordTabs } from "./_parts/record-tabs";
import { TrustFigures } from "./_parts/trust-figures";
import { TrustFilters } from "./_parts/trust-filters";
import { TrustGroups } from "./_parts/trust-groups";
import { TrustPlots } from "./_parts/trust-plots";
import { TrustSurprises } from "./_parts/trust-surprises";

export const metadata: Metadata = { title: "Record" };

export default async function RecordPage(props: {
  searchParams: Promise<Record<string, string | undefined>>;
}) {
  const params = await props.searchParams;
  const view = await readTrust(deps(), await requireActor(), {
    days: params.days ?? "365",
    group: (params.group ?? "chemistry") as never,
    crew: params.crew ?? null,
  });
  return (
    <>
      <PageHead
        title="Can the dates be trusted?"
        lede="On the first day of each quarter the forecast of every pack in service goes on record. Here each is held against what has come since."
      />
      <RecordTabs current="trust" />
      <TrustFigures view={view} />
      <TrustFilters view={view} params={params} />
      <TrustGroups view={view} />
      <TrustPlots view={view} />
      <TrustSurprises view={view} />
    </>
  );
}
