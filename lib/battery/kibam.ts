/**
 * The kinetic battery model (Manwell & McGowan, 1993): two wells of charge, available y1
 * and bound y2, with y1' = -I + k(h2 - h1), y2' = -k(h2 - h1), h1 = y1/c, h2 = y2/(1-c)
 * and k' = k/(c(1-c)). Empty when y1 reaches 0. Solved in closed form on each piece of
 * constant load. A verification model: at microamp draws its recovery is negligible.
 *
 * Any consistent units: capacity = current x time.
 */
export interface Kibam {
  readonly capacity: number;
  /** Share of the capacity in the available well. */
  readonly c: number;
  /** k' = k/(c(1-c)), per unit of time. */
  readonly kPrime: number;
}

export interface LoadPiece {
  readonly current: number;
  readonly duration: number;
}

interface Wells {
  /** Charge drawn so far. */
  readonly drawn: number;
  /** Height difference h2 - h1. */
  readonly gap: number;
}

/** Available charge y1 = c (capacity - drawn) - c(1-c) gap. */
function available(model: Kibam, wells: Wells): number {
  return model.c * (model.capacity - wells.drawn - (1 - model.c) * wells.gap);
}

function advance(model: Kibam, wells: Wells, current: number, time: number): Wells {
  const decay = Math.exp(-model.kPrime * time);
  const settled = current / (model.c * model.kPrime);
  return { drawn: wells.drawn + current * time, gap: wells.gap * decay + settled * (1 - decay) };
}

/** Time at which the available well empties while `pieces` repeat; Infinity past `limit`. */
export function kibamLifetime(model: Kibam, pieces: readonly LoadPiece[], limit = 1e7): number {
  let wells: Wells = { drawn: 0, gap: 0 };
  let time = 0;
  while (time < limit) {
    for (const piece of pieces) {
      const next = advance(model, wells, piece.current, piece.duration);
      if (available(model, next) <= 0) return time + emptyWithin(model, wells, piece);
      wells = next;
      time += piece.duration;
    }
  }
  return Infinity;
}

/** Moment within a piece at which y1 first reaches 0, by bisection to machine precision. */
function emptyWithin(model: Kibam, wells: Wells, piece: LoadPiece): number {
  let low = 0;
  let high = piece.duration;
  for (let i = 0; i < 60; i++) {
    const middle = (low + high) / 2;
    if (available(model, advance(model, wells, piece.current, middle)) > 0) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

/** Rate constant by Arrhenius, k = A exp(-Ea/RT); Ea in kJ/mol, temperature in °C. */
export function arrheniusRate(a: number, eaKjPerMol: number, celsius: number): number {
  return a * Math.exp(-eaKjPerMol / (0.008314 * (celsius + 273.15)));
}
