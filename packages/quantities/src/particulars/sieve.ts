/** A sieve plate by its number: `000`, `00`, `0`, then half steps `1` to `20`. */
const SMALLEST: Readonly<Record<string, number>> = { '000': 900, '00': 1000, '0': 1100 };

/**
 * Opening of a plate in thousandths of a millimetre: 0.90, 1.00 and 1.10 mm for 000, 00 and 0, then
 * from 1.15 mm at plate 1 0.05 mm a half step to 5.5, 0.10 mm beyond. Common practice, no source; a
 * house has its own plates. Null for what isn't a plate.
 */
export function plateOpening(plate: string): number | null {
  const smallest = Object.hasOwn(SMALLEST, plate) ? SMALLEST[plate] : undefined;
  if (smallest !== undefined) return smallest;
  if (!/^(1?\d(\.5)?|20)$/.test(plate)) return null;
  const number = Number(plate);
  if (number < 1) return null;
  return number <= 5.5 ? 1150 + (number - 1) * 100 : 1600 + (number - 5.5) * 200;
}

/** Two plates: the one goods stay on and the one they fall through; null where that side is open. */
export interface SieveRange {
  on: string | null;
  through: string | null;
}

/**
 * Whether a stone that stays on a plate belongs to goods named by two plates, `+6.5-11`: it stays on
 * 6.5 and falls through 11 (*Polished Diamond Grading*, a diamond school's course book, p. 24).
 * Null where a plate is not known.
 */
export function isInSieveRange({ on, through }: SieveRange, plate: string): boolean | null {
  const stone = plateOpening(plate);
  const least = on === null ? 0 : plateOpening(on);
  const most = through === null ? Number.POSITIVE_INFINITY : plateOpening(through);
  if (stone === null || least === null || most === null) return null;
  return least <= stone && stone < most;
}

/** Reads `+6.5-11`, `-2`, `+11` as two plates; null where they are none, or stand the wrong way round. */
export function readSieve(text: string): SieveRange | null {
  const match = /^(?=.{1,20}$)(?:\+\s*([\d.]+))?\s*(?:[-−–]\s*([\d.]+))?$/.exec(text.trim());
  const [on = null, through = null] = [match?.[1], match?.[2]];
  const plates = [on, through].filter((plate) => plate !== null);
  const openings = plates.map(plateOpening).filter((opening) => opening !== null);
  if (plates.length === 0 || openings.length < plates.length) return null;
  const [least = 0, most = Number.POSITIVE_INFINITY] = openings;
  return least < most ? { on, through } : null;
}

/** About what a round of such a diameter (thousandths of a millimetre) weighs, in carats: 0.00369 d³, our own model. */
export function roundOfDiameter(diameter: number): number {
  return 0.00369 * (diameter / 1000) ** 3;
}
