"use client";

import "leaflet/dist/leaflet.css";
import L from "leaflet";
import Supercluster from "supercluster";
import { useEffect, useRef } from "react";
import { clusterMarker, discMarker, districtLayer, type MapDisc } from "./map-layers";
import { type RoundMarks, useRounds } from "./use-rounds";

export interface LeafletMapProps extends RoundMarks {
  /** What the map shows, for those who cannot see it; a list with the same stands beside it. */
  label: string;
  discs: readonly MapDisc[];
  chosenDisc?: string | null;
  tileUrl?: string | null;
  onSelect?: (id: string) => void;
  className?: string;
}

const nobody = () => undefined;

/** The map itself: Leaflet needs a page, so it is loaded in the browser only. */
export function LeafletMap(props: LeafletMapProps) {
  const { label, discs, rounds, chosenRound, chosenDisc, tileUrl, onSelect = nobody } = props;
  const holder = useRef<HTMLDivElement>(null);
  const map = useRef<L.Map | null>(null);

  useEffect(() => {
    if (!holder.current) return;
    const made = L.map(holder.current, { zoomSnap: 0.5, attributionControl: Boolean(tileUrl) });
    made.setView([52.6, 0.1], 10);
    map.current = made;
    const stop = new AbortController();
    if (tileUrl) L.tileLayer(tileUrl, { maxZoom: 19 }).addTo(made);
    else void drawDistrict(made, stop.signal);
    return () => {
      stop.abort();
      made.remove();
      map.current = null;
    };
  }, [tileUrl]);

  useEffect(() => {
    const on = map.current;
    if (!on) return;
    const shown = rounds.find((round) => round.id === chosenRound);
    const points = shown ? [shown.depot, ...shown.stops] : discs;
    if (points.length > 0) {
      const bounds = L.latLngBounds(points.map((p) => [p.latitude, p.longitude]));
      on.fitBounds(bounds, { padding: [24, 24], maxZoom: 14, animate: false });
    }
  }, [rounds, chosenRound, discs]);
  useRounds(map, props);

  useEffect(() => {
    const on = map.current;
    if (!on) return;
    const group = L.layerGroup().addTo(on);
    const index = clustered(discs);
    const draw = () => drawDiscs(on, group, index, discs, chosenDisc ?? null, onSelect);
    draw();
    on.on("moveend", draw);
    return () => {
      on.off("moveend", draw);
      group.remove();
    };
  }, [discs, chosenDisc, onSelect]);

  const height = props.className ?? "h-90";
  return (
    <div
      ref={holder}
      role="group"
      aria-label={label}
      // Leaflet's own grey ground comes from a class; a style is stronger.
      style={{ background: "var(--paper)" }}
      className={`isolate font-sans ${height}`}
    />
  );
}

async function drawDistrict(map: L.Map, signal: AbortSignal): Promise<void> {
  try {
    const response = await fetch("/district.geojson", { signal });
    if (!response.ok || signal.aborted) return;
    const layer = districtLayer((await response.json()) as GeoJSON.FeatureCollection);
    if (!signal.aborted) layer.addTo(map).bringToBack();
  } catch {
    // Without the drawing the marks still stand in their places.
  }
}

type Index = Supercluster<{ readonly at: number }>;

function clustered(discs: readonly MapDisc[]): Index {
  const index: Index = new Supercluster({ radius: 26, maxZoom: 15 });
  return index.load(
    discs.map((disc, at) => ({
      type: "Feature",
      properties: { at },
      geometry: { type: "Point", coordinates: [disc.longitude, disc.latitude] },
    })),
  );
}

function drawDiscs(
  map: L.Map,
  group: L.LayerGroup,
  index: Index,
  discs: readonly MapDisc[],
  chosen: string | null,
  onSelect: (id: string) => void,
): void {
  group.clearLayers();
  const b = map.getBounds();
  const zoom = Math.round(map.getZoom());
  const box: [number, number, number, number] = [
    b.getWest(),
    b.getSouth(),
    b.getEast(),
    b.getNorth(),
  ];
  for (const found of index.getClusters(box, zoom)) {
    const [longitude = 0, latitude = 0] = found.geometry.coordinates;
    if ("cluster" in found.properties && found.properties.cluster) {
      const { point_count: count, cluster_id: id } = found.properties;
      const open = () => map.setView([latitude, longitude], index.getClusterExpansionZoom(id));
      clusterMarker({ latitude, longitude }, count, open).addTo(group);
    } else {
      const disc = discs[(found.properties as { at: number }).at]!;
      if (disc.id !== chosen) discMarker(disc, false, onSelect).addTo(group);
    }
  }
  const one = discs.find((disc) => disc.id === chosen);
  if (one) discMarker(one, true, onSelect).addTo(group);
}
