import type { Metadata } from "next";
import { deps } from "@/lib/server/deps";
import { requireActor } from "@/lib/server/session";
import { readMap } from "@/lib/usecases/read-map";
import { MapScreen } from "./_parts/map-screen";

export const metadata: Metadata = { title: "Map" };

export default async function MapPage(props: {
  searchParams: Promise<{ within?: string; week?: string }>;
}) {
  const { within = "90", week = null } = await props.searchParams;
  const query = { within: within as "90", week };
  const view = await readMap(deps(), await requireActor(), query);
  return (
    <>
      <h1 className="sr-only">Map</h1>
      <MapScreen key={`${view.within} ${view.monday}`} initial={view} />
    </>
  );
}
