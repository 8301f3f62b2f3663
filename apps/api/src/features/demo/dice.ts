import { uniformInt } from 'pure-rand/distribution/uniformInt';
import { xoroshiro128plus } from 'pure-rand/generator/xoroshiro128plus';

/** Chance that is the same each time it begins at the same number. */
export interface Dice {
  /** A whole number from least to most, both included. */
  between(least: number, most: number): number;
  /** True so many times in a hundred. */
  percent(chance: number): boolean;
  pick<T>(from: readonly T[]): T;
}

/** Dice that begin at a number. */
export function diceFrom(start: number): Dice {
  const generator = xoroshiro128plus(start);
  const between = (least: number, most: number) => uniformInt(generator, least, most);
  return {
    between,
    percent: (chance) => between(1, 100) <= chance,
    pick: (from) => from[between(0, from.length - 1)] as (typeof from)[number],
  };
}
