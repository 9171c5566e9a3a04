/**
 * How cold a cell may be while it works, and what goes for its chemistry whatever its maker.
 * Makers' sheets differ by a few degrees; all figures here are from memory and stand for the
 * usual sheet of that chemistry.
 */
import type { Chemistry } from "@/lib/battery";
import type { Decicelsius } from "@/lib/units";

/** Lowest temperature at which the usual sheet lets a cell work, tenths of a degree. */
export const COLDEST_DC: Readonly<Record<Chemistry, Decicelsius>> = {
  alkaline: -200,
  "zinc-carbon": -100,
  "li-fes2": -400,
  "li-socl2": -550,
  "li-mno2": -300,
  "silver-oxide": -100,
  vrla: -200,
  lifepo4: -200,
};
