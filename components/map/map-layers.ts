import L from "leaflet";
import type { WaneDiscModel } from "@/lib/present/wane-disc";
import { clusterMarkup, depotMarkup, discMarkup, dotMarkup, stopMarkup } from "./disc-icon";

export interface MapPoint {
  readonly latitude: number;
  readonly longitude: number;
}

export interface MapDisc extends MapPoint {
  readonly id: string;
  /** Read out and shown on hover. */
  readonly label: string;
  readonly disc: WaneDiscModel;
}

export interface MapRound {
  readonly id: string;
  readonly label: string;
  readonly depot: MapPoint;
  readonly stops: readonly (MapPoint & { readonly id: string; readonly label: string })[];
}

function icon(html: string, size: number): L.DivIcon {
  return L.divIcon({ html, className: "", iconSize: [size, size] });
}

/** Colours come from the tokens, so that the map changes with day and night. */
function token(name: string): string {
  return getComputedStyle(document.documentElement).getPropertyValue(`--${name}`).trim();
}

/** The invented or real district beneath everything: water, roads, land. */
export function districtLayer(data: GeoJSON.FeatureCollection): L.GeoJSON {
  const styles: Record<string, L.PathOptions> = {
    water: { color: token("water"), weight: 3, fillColor: token("water"), fillOpacity: 1 },
    road: { color: token("rule"), weight: 1.5 },
    land: { color: token("hair"), weight: 1, fillColor: token("land"), fillOpacity: 1 },
  };
  const kindOf = (properties: GeoJSON.GeoJsonProperties): string => {
    const kind = String(properties?.kind ?? "");
    if (/road|lane|track/.test(kind)) return "road";
    return /river|drain|water|mere|dyke|channel/.test(kind) ? "water" : "land";
  };
  return L.geoJSON(data, {
    interactive: false,
    filter: (feature) => feature.geometry.type !== "Point",
    style: (feature) => ({ ...styles[kindOf(feature?.properties ?? null)], interactive: false }),
  });
}

/** One pack's mark. */
export function discMarker(
  mark: MapDisc,
  chosen: boolean,
  onSelect: (id: string) => void,
): L.Marker {
  const size = chosen ? 26 : 16;
  const marker = L.marker([mark.latitude, mark.longitude], {
    icon: icon(discMarkup(mark.disc, size), size),
    title: mark.label,
    alt: mark.label,
    keyboard: chosen,
    zIndexOffset: chosen ? 1000 : 0,
  });
  return marker.on("click", () => onSelect(mark.id));
}

export function clusterMarker(at: MapPoint, count: number, onOpen: () => void): L.Marker {
  const label = `${count} packs; press to look closer`;
  const marker = L.marker([at.latitude, at.longitude], {
    icon: icon(clusterMarkup(count), 28),
    title: label,
    alt: label,
    keyboard: false,
  });
  return marker.on("click", onOpen);
}

/** A round's line from depot to depot, and its depot. */
export function roundLine(
  round: MapRound,
  chosen: boolean,
  onRound: (roundId: string) => void,
): L.LayerGroup {
  const path = [round.depot, ...round.stops, round.depot].map((p): L.LatLngTuple => [
    p.latitude,
    p.longitude,
  ]);
  const line = L.polyline(path, {
    color: token("dusk"),
    weight: chosen ? 2.5 : 1.5,
    opacity: chosen ? 1 : 0.55,
  });
  line.on("click", () => onRound(round.id));
  const depot = L.marker([round.depot.latitude, round.depot.longitude], {
    icon: icon(depotMarkup, 16),
    title: "Depot",
    alt: "Depot",
    keyboard: false,
  });
  return L.layerGroup([line, depot]);
}

export interface StopMark {
  readonly id: string;
  readonly marker: L.Marker;
  /** Makes it stand out, or no longer; the focus stays where it is. */
  readonly light: (chosen: boolean) => void;
}

/** A round's stops: numbered and reached by the keyboard where it is the chosen one, else dots. */
export function stopMarks(
  round: MapRound,
  numbered: boolean,
  onStop: (stopId: string, roundId: string) => void,
): StopMark[] {
  return round.stops.map((stop, i) => {
    const name = numbered ? `${i + 1}. ${stop.label}` : `${stop.label}, ${round.label}`;
    const look = (chosen: boolean) =>
      numbered ? icon(stopMarkup(i + 1, chosen), chosen ? 30 : 24) : icon(dotMarkup, 12);
    const marker = L.marker([stop.latitude, stop.longitude], {
      icon: look(false),
      title: name,
      keyboard: numbered,
    });
    const choose = () => onStop(stop.id, round.id);
    marker.on("click", choose);
    // Leaflet lets a marker have the focus, but Enter clicks none
    marker.on("keypress", ({ originalEvent }: L.LeafletKeyboardEvent) => {
      if (originalEvent.key === "Enter") choose();
    });
    const light = (chosen: boolean) => {
      const stands = numbered && chosen;
      marker.setIcon(look(stands)).setZIndexOffset(stands ? 800 : numbered ? 500 : 200);
      marker.getElement()?.setAttribute("title", stands ? `${name}, chosen` : name);
    };
    return { id: stop.id, marker, light };
  });
}
