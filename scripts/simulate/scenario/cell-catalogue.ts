import type { CellMake } from "../cell";
import type { CatalogueCell } from "./catalogue-cell";
import { AQUEOUS_CELLS } from "./cells-aqueous";
import { LITHIUM_CELLS } from "./cells-lithium";

/** The cell types of the scenario. */
export const CELL_CATALOGUE: readonly CatalogueCell[] = [...AQUEOUS_CELLS, ...LITHIUM_CELLS].map(
  ({ points, ...rest }) => {
    const [rated, ...more] = points;
    if (!rated) throw new Error(`cell catalogue: ${rest.designation} has no rated capacity`);
    return { ...rest, rated, capacityTable: more };
  },
);

/** The makes behind the catalogue, keyed by designation. */
export const CELL_MAKES: readonly CellMake[] = CELL_CATALOGUE.map((cell) => ({
  key: cell.designation,
  chemistry: cell.chemistry,
  ...cell.make,
}));

export function catalogueCell(designation: string): CatalogueCell {
  const found = CELL_CATALOGUE.find((cell) => cell.designation === designation);
  if (!found) throw new Error(`cell catalogue: ${designation} is not in it`);
  return found;
}
