/** Whether a site fits: into the van, into what stores hold, and between two stops. */
import { FORBIDDEN } from "./model";
import { FIELDS, LATEST, LEAVE, NODE, type RouteState } from "./state";

/** Whether the van still holds the site's cells beside the route's. */
export function fitsVan(state: RouteState, site: number, r: number): boolean {
  const { loads, demand, capacity } = state.model;
  for (let i = 0; i < loads; i++) {
    if (state.cells.load[r * loads + i]! + demand[site * loads + i]! > capacity[r * loads + i]!) {
      return false;
    }
  }
  return true;
}

/** Whether stores still hold the site's cells, on the route's day and all days after it. */
export function fitsStock(state: RouteState, site: number, r: number): boolean {
  const { stocks, days, dayOf, loads, demand } = state.model;
  for (let i = 0; i < stocks; i++) {
    const cells = demand[site * loads + i]!;
    if (cells === 0) continue;
    for (let d = i * days + dayOf[r]!; d < (i + 1) * days; d++) {
      if (state.cells.left[d]! < cells) return false;
    }
  }
  return true;
}

/** Whether a site may be put behind position k of a route: the O(1) test. */
export function fits(state: RouteState, site: number, r: number, k: number): boolean {
  const { model, data } = state;
  if (model.visit[site * model.slots + r] === FORBIDDEN || !fitsVan(state, site, r)) return false;
  if (!fitsStock(state, site, r)) return false;
  const at = r * state.row + k * FIELDS;
  const row = site * model.nodes;
  const window = model.windowRow[r]! + site;
  const arrive = data[at + LEAVE]! + model.timeInto[row + data[at + NODE]!]!;
  const start = Math.max(arrive, model.open[window]!);
  const next = start + model.service[site]! + model.timeOut[row + data[at + FIELDS + NODE]!]!;
  return start <= model.close[window]! && next <= data[at + FIELDS + LATEST]!;
}
