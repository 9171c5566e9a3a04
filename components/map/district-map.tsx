"use client";

import dynamic from "next/dynamic";
import { Skeleton } from "@/components/ui/states";
import type { LeafletMapProps } from "./leaflet-map";

/** A map of the district; Leaflet runs in the browser only, so its place is kept until then. */
export const DistrictMap = dynamic<LeafletMapProps>(
  () => import("./leaflet-map").then((module) => module.LeafletMap),
  { ssr: false, loading: () => <Skeleton label="Loading the map" rows={5} shape="figures" /> },
);
