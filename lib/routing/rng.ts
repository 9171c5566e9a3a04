/**
 * Seeded chance for the search: xorshift with 32 bits of state (Marsaglia 2003, "Xorshift RNGs",
 * doi 10.18637/jss.v008.i14, triple 13-17-5). Fast and repeatable; not for secrets.
 */
export interface Rng {
  /** Next whole number from 1 to 2^32 - 1. */
  next(): number;
  /** Whole number from 0 to `size` - 1. */
  below(size: number): number;
  /** Number in (0, 1). */
  unit(): number;
}

/** One step of the generator on 32 bits of state. */
export function xorshift32(state: number): number {
  let x = state;
  x ^= x << 13;
  x ^= x >>> 17;
  x ^= x << 5;
  return x >>> 0;
}

class Xorshift32 implements Rng {
  private state: number;

  constructor(seed: number) {
    // Spread small seeds over all bits (Knuth's multiplicative hash); zero is a fixed point.
    this.state = Math.imul(seed | 0, 0x9e3779b1) ^ 0x5bd1e995 || 1;
    for (let i = 0; i < 8; i++) this.next();
  }

  next(): number {
    this.state = xorshift32(this.state);
    return this.state;
  }

  below(size: number): number {
    return Math.floor((this.next() / 4294967296) * size);
  }

  unit(): number {
    return this.next() / 4294967296;
  }
}

/** A generator that repeats for the same whole-numbered seed. */
export function seededRng(seed: number): Rng {
  return new Xorshift32(seed);
}
