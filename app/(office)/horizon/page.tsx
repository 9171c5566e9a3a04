import type { Metadata } from "next";
import { deps } from "@/lib/server/deps";
import { requireActor } from "@/lib/server/session";
import { readHorizon } from "@/lib/usecases/read-horizon";
import { HorizonFigures } from "./_parts/horizon-figures";
import { HorizonFilters } from "./_parts/horizon-filters";
import { HorizonTable } from "./_parts/horizon-table";
import { type HorizonParams, readParams } from "./_parts/horizon-params";

export const metadata: Metadata = { title: "Horizon" };

export default async function HorizonPage(props: { searchParams: Promise<HorizonParams> }) {
  const params = await props.searchParams;
  const view = await readHorizon(deps(), await requireActor(), readParams(params));
  return (
    <>
      <h1 className="sr-only">Horizon</h1>
      <HorizonFigures view={view} />
      <HorizonFilters view={view} params={params} />
      <HorizonTable view={view} params={params} />
    </>
  );
}
