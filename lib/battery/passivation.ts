/**
 * The film on the lithium of a thionyl chloride cell grows at rest and dips the voltage for a
 * moment under load, the more the longer it rested (Maxell ER: LiCl film after storage gives a
 * transient minimum voltage). A low loaded reading may be that dip and not an empty cell.
 */
import type { EpochDays } from "../units";
import { ASSUMED } from "./assumptions";
import type { PackModel } from "./pack-model";

/** A peak this many times the average is a pulse that breaks the film again and again. */
const PULSE_RATIO = 10;
/** Cells that were never read under load come from the shelf. */
const SHELF_DAYS = 365;

/** Chance that a low loaded reading is the film's, after so many days without one; 0: no film. */
export function filmChance(model: PackModel, restDays: EpochDays): number {
  if (model.pack.cell.chemistry !== "li-socl2") return 0;
  const pulsed = model.peakUa > PULSE_RATIO * model.averageUa && restDays < Infinity;
  const most = pulsed ? ASSUMED.filmMostPulsed : ASSUMED.filmMost;
  return most * -Math.expm1(-Math.min(restDays, SHELF_DAYS) / ASSUMED.filmDays);
}
