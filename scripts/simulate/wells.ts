/**
 * Two wells of charge (kinetic battery model; Manwell & McGowan, Solar Energy 50:399, 1993):
 * a load empties the near well, the far well refills it in proportion to the difference of
 * their heights. The closed form for a constant current is used, so a step may be any length.
 */
export interface Wells {
  /** Charge in the near and in the far well, mAh. */
  readonly near: number;
  readonly far: number;
}

export interface WellConstants {
  /** Share of all charge that the near well holds. */
  readonly share: number;
  /** Rate constant k' = k/(c(1−c)), per hour. */
  readonly ratePerHour: number;
}

/** Both wells full, at equal height. */
export function fullWells(chargeMah: number, share: number): Wells {
  return { near: share * chargeMah, far: (1 - share) * chargeMah };
}

/** The wells after `hours` at a constant `currentMa`. The near well may come out negative: empty. */
export function drain(wells: Wells, k: WellConstants, currentMa: number, hours: number): Wells {
  const kt = k.ratePerHour * hours;
  const e = Math.exp(-kt);
  const total = wells.near + wells.far;
  const flow = (1 - e) / k.ratePerHour;
  const lag = (kt - 1 + e) / k.ratePerHour;
  return {
    near: wells.near * e + total * k.share * (1 - e) - currentMa * (flow + k.share * lag),
    far: wells.far * e + total * (1 - k.share) * (1 - e) - currentMa * (1 - k.share) * lag,
  };
}

/** What is left when a share of the charge has leaked away inside the cell. */
export function leak(wells: Wells, share: number): Wells {
  return { near: wells.near * (1 - share), far: wells.far * (1 - share) };
}

/** Height of the near well relative to full, 0..1 (below 0 when over-drawn). */
export function nearLevel(wells: Wells, chargeMah: number, share: number): number {
  return wells.near / (share * chargeMah);
}
