/**
 * Peukert's law (W. Peukert, 1897): t = (C/I) (C/(I h))^(k-1) for a cell rated C over h
 * hours. Valid only between the two currents at which k was found; the forecast uses the
 * capacity table instead and this stands as a check of it.
 */

/** Exponent k from two discharges: currents in any one unit, capacities in any one unit. */
export function peukertExponent(
  currentA: number,
  capacityA: number,
  currentB: number,
  capacityB: number,
): number {
  const hoursA = capacityA / currentA;
  const hoursB = capacityB / currentB;
  return Math.log(hoursB / hoursA) / Math.log(currentA / currentB);
}

/** Hours to empty at a current, for a capacity rated over `ratedHours`. */
export function peukertHours(
  capacity: number,
  current: number,
  ratedHours: number,
  exponent: number,
): number {
  return (capacity / current) * (capacity / (current * ratedHours)) ** (exponent - 1);
}
