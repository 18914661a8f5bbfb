/** Numbers that look random and are the same for the same seed (xorshift32, Marsaglia 2003). */
export class Chance {
  #state: number;

  constructor(seed: number) {
    this.#state = (Math.imul(seed + 1, 0x9e3779b1) ^ 0x5bd1e995) >>> 0 || 1;
    for (let i = 0; i < 8; i++) this.next();
  }

  /** 0 to 1. */
  next(): number {
    this.#state ^= this.#state << 13;
    this.#state ^= this.#state >>> 17;
    this.#state ^= this.#state << 5;
    this.#state >>>= 0;
    return this.#state / 2 ** 32;
  }

  between(least: number, most: number): number {
    return least + this.next() * (most - least);
  }

  whole(least: number, most: number): number {
    return Math.floor(this.between(least, most + 1));
  }

  is(share: number): boolean {
    return this.next() < share;
  }

  pick<T>(from: readonly T[]): T {
    return from[Math.floor(this.next() * from.length)] as T;
  }

  /** Mean 0, deviation 1, near enough to normal. */
  noise(): number {
    return (this.next() + this.next() + this.next() + this.next() - 2) * Math.sqrt(3);
  }
}
