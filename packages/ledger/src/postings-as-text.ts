import { formatAmount, formatCarats } from '@foldwell/quantities';

import type { Posting } from './leg.js';
import { lotName, placeName } from './test-book.js';

/**
 * For tests only: postings as the posting table writes them, `A safe -8.00/-120/-3,080.00`, what
 * meets at one lot and place added up (as the database keeps it) and nothing dropped.
 */
export function postingsAsText(postings: Posting[]): string[] {
  const rows = new Map<string, [number, number, number]>();
  for (const { lot, place, weight, pieces, cost } of postings) {
    const key = `${lotName(lot)} ${placeName(place)}`;
    const [w, p, c] = rows.get(key) ?? [0, 0, 0];
    rows.set(key, [w + weight, p + pieces, c + cost]);
  }
  return [...rows]
    .filter(([, sums]) => sums.some((sum) => sum !== 0))
    .map(([key, [weight, pieces, cost]]) => {
      const money = signed(cost, formatAmount(Math.abs(cost), 'USD'));
      return `${key} ${signed(weight, formatCarats(Math.abs(weight)))}/${signed(pieces, String(Math.abs(pieces)))}/${money}`;
    });
}

function signed(value: number, size: string): string {
  return value === 0 ? '0' : `${value < 0 ? '-' : '+'}${size}`;
}
