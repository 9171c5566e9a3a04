/** Plans in and out of the search: what two searches hand each other. */
import { fits } from "./fit";
import type { Routes } from "./problem";
import type { RouteState } from "./state";

/** The plan in the problem's words. */
export function exportRoutes(state: RouteState): number[][] {
  return Array.from(state.length, (length, r) =>
    Array.from({ length }, (_, k) => state.siteAt(r, k + 1)),
  );
}

/** Takes a plan over as far as it can be driven; other stops stay out. */
export function importRoutes(state: RouteState, routes: Routes): void {
  const { model } = state;
  state.mark();
  for (let r = 0; r < model.slots; r++) {
    const free = state.length[r]! - model.frozen[r]!;
    if (free > 0) state.remove(r, model.frozen[r]! + 1, free);
  }
  routes.slice(0, model.slots).forEach((route, r) => {
    for (const site of route) {
      const known = site >= 0 && site < model.sites && state.routeOf[site] === -1;
      const last = state.length[r]!;
      if (known && fits(state, site, r, last)) state.insert(site, r, last);
    }
  });
  state.mark();
}
