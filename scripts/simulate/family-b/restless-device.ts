/**
 * A device whose draw changes by spells (a poor link, a busier season, a fixed fault) rather
 * than wandering, and follows the cold; and the air around it.
 */
import type { Rng } from "../prng";

const SPELL_DAYS = 150;

export interface RestlessDevice {
  readonly averageMa: number;
  readonly peakMa: number;
  readonly perKelvin: number;
  spell: number;
  spellLeft: number;
}

export function newDevice(averageMa: number, peakMa: number, rng: Rng): RestlessDevice {
  return {
    averageMa: averageMa * rng.logNormal(0.15),
    peakMa: peakMa * rng.logNormal(0.06),
    perKelvin: rng.uniform(-0.002, 0.008),
    spell: 1,
    spellLeft: 0,
  };
}

/** Mean current of one day, mA. */
export function dayDrawMa(device: RestlessDevice, celsius: number, rng: Rng): number {
  if (device.spellLeft <= 0) {
    device.spell = rng.logNormal(0.1);
    device.spellLeft = -SPELL_DAYS * Math.log(1 - rng.next());
  }
  device.spellLeft -= 1;
  return device.averageMa * device.spell * Math.max(0.5, 1 + device.perKelvin * (12 - celsius));
}

export interface Air {
  readonly meanC: number;
  readonly amplitudeC: number;
  departure: number;
}

export function newAir(rng: Rng): Air {
  return { meanC: rng.uniform(7, 14), amplitudeC: rng.uniform(5, 11), departure: 0 };
}

/** Mean and lowest temperature of a day. */
export function dayAir(air: Air, day: number, rng: Rng): { meanC: number; minC: number } {
  air.departure = 0.8 * air.departure + rng.normal(0, 1.8);
  const meanC = climateC(air, day) + air.departure;
  return { meanC, minC: meanC - rng.uniform(2, 7) };
}

/** Long-term mean of a day of the year. */
export function climateC(air: Pick<Air, "meanC" | "amplitudeC">, day: number): number {
  return air.meanC + air.amplitudeC * Math.cos((2 * Math.PI * (day - 200)) / 365.25);
}
