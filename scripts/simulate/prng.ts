/**
 * Seeded randomness: Bob Jenkins' small fast counter generator (sfc32), keyed by text.
 * A world forks one generator for every asset, cell and meter, so that what one of them
 * draws never shifts what another draws: visiting one asset leaves all others' fates alone.
 */
export interface Rng {
  /** Uniform on [0, 1). */
  next(): number;
  /** Standard normal (Box-Muller, one value a call, so that state stays four integers). */
  normal(mean?: number, sd?: number): number;
  /** exp(N(0, sd)), median 1. */
  logNormal(sd: number): number;
  uniform(low: number, high: number): number;
  /** Integer from low to high, both included. */
  int(low: number, high: number): number;
  chance(probability: number): boolean;
  pick<T>(items: readonly T[]): T;
  shuffle<T>(items: readonly T[]): T[];
  /** An independent generator for the thing called `key`. */
  fork(key: string): Rng;
  /** A twin that will draw the same values from here on. */
  clone(): Rng;
}

type State = [number, number, number, number];

/** Four words from a text (FNV-1a with a final avalanche, once for each word). */
function hash(text: string): State {
  const words = [0x9e3779b9, 0x243f6a88, 0xb7e15162, 0x6a09e667].map((basis) => {
    let h = basis;
    for (let i = 0; i < text.length; i++) h = Math.imul(h ^ text.charCodeAt(i), 0x01000193);
    h = Math.imul(h ^ (h >>> 16), 0x21f0aaad);
    h = Math.imul(h ^ (h >>> 15), 0x735a2d97);
    return (h ^ (h >>> 15)) >>> 0;
  });
  return words as State;
}

class Sfc32 implements Rng {
  private a: number;
  private b: number;
  private c: number;
  private d: number;

  constructor(
    private readonly name: string,
    [a, b, c, d]: State,
  ) {
    [this.a, this.b, this.c, this.d] = [a, b, c, d];
  }

  next(): number {
    const t = (((this.a + this.b) | 0) + this.d) | 0;
    this.d = (this.d + 1) | 0;
    this.a = this.b ^ (this.b >>> 9);
    this.b = (this.c + (this.c << 3)) | 0;
    this.c = (((this.c << 21) | (this.c >>> 11)) + t) | 0;
    return (t >>> 0) / 4294967296;
  }

  normal(mean = 0, sd = 1): number {
    const radius = Math.sqrt(-2 * Math.log(1 - this.next()));
    return mean + sd * radius * Math.cos(2 * Math.PI * this.next());
  }

  logNormal(sd: number): number {
    return Math.exp(this.normal(0, sd));
  }

  uniform(low: number, high: number): number {
    return low + (high - low) * this.next();
  }

  int(low: number, high: number): number {
    return low + Math.floor(this.next() * (high - low + 1));
  }

  chance(probability: number): boolean {
    return this.next() < probability;
  }

  pick<T>(items: readonly T[]): T {
    if (items.length === 0) throw new RangeError("pick: nothing to choose from");
    return items[Math.floor(this.next() * items.length)] as T;
  }

  shuffle<T>(items: readonly T[]): T[] {
    const copy = [...items];
    for (let i = copy.length - 1; i > 0; i--) {
      const j = this.int(0, i);
      [copy[i], copy[j]] = [copy[j] as T, copy[i] as T];
    }
    return copy;
  }

  fork(key: string): Rng {
    return createRng(`${this.name}/${key}`);
  }

  clone(): Rng {
    return new Sfc32(this.name, [this.a, this.b, this.c, this.d]);
  }
}

/** A generator for a seed: the same seed draws the same values on every machine. */
export function createRng(seed: string | number): Rng {
  const name = String(seed);
  const rng = new Sfc32(name, hash(name));
  for (let i = 0; i < 12; i++) rng.next();
  return rng;
}
