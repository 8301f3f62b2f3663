/** Numbers that look random and come again for the same seed (mulberry32, public domain). */
export class Dice {
  #state: number;

  constructor(seed: number) {
    this.#state = seed >>> 0;
  }

  /** From 0 up to, not including, 1. */
  next(): number {
    this.#state = (this.#state + 0x6d2b79f5) >>> 0;
    let mixed = this.#state;
    mixed = Math.imul(mixed ^ (mixed >>> 15), mixed | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4294967296;
  }

  /** A whole number between two, both included. */
  between(least: number, most: number): number {
    return least + Math.floor(this.next() * (most - least + 1));
  }

  isLucky(chance: number): boolean {
    return this.next() < chance;
  }

  /** One of several; undefined where there are none. */
  one<T>(several: readonly T[]): T | undefined {
    return several[this.between(0, several.length - 1)];
  }
}
