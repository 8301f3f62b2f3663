import { grouped } from '../grouped.js';

/** `48.62`, or three decimals where the third isn't zero; a true minus. No unit: that stands beside it. */
export function formatCarats(weight: number, alwaysThree = false): string {
  const size = Math.abs(weight);
  const places = size % 10 === 0 && !alwaysThree ? 2 : 3;
  const whole = grouped(String(Math.floor(size / 1000)));
  const rest = String(size % 1000)
    .padStart(3, '0')
    .slice(0, places);
  return `${weight < 0 ? '−' : ''}${whole}.${rest}`;
}

/** A column of weights, all with three decimals where any third decimal isn't zero, else all with two. */
export function formatCaratsColumn(weights: readonly number[]): string[] {
  const hasThirds = weights.some((weight) => weight % 10 !== 0);
  return weights.map((weight) => formatCarats(weight, hasThirds));
}

/** A difference in points with its sign and unit: `−8 pt`, `+1 pt`, `0 pt`, tenths where needed. */
export function formatPoints(weight: number): string {
  const size = Math.abs(weight);
  const text = size % 10 === 0 ? String(size / 10) : `${Math.floor(size / 10)}.${size % 10}`;
  return `${weight < 0 ? '−' : weight > 0 ? '+' : ''}${text} pt`;
}
