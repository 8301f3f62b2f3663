/** What the girdle adds to a weight by formula, for stones up to 4.10 mm, to 6.90 mm and beyond. */
type Row = readonly [small: number, middle: number, large: number];

/**
 * "Estimating Mounted Diamond Weight", chapter 11 of an anonymous web course on diamonds, 11.09.
 * Medium to slightly thick at 3.10 to 4.10 mm is printed as 1.05, surely for 1.015.
 */
const FACTORS: Readonly<Record<string, Row>> = {
  'extremely thin': [0.97, 0.96, 0.95],
  thin: [0.985, 0.98, 0.975],
  'thin to medium': [0.99, 0.985, 0.98],
  medium: [1, 1, 1],
  'medium to slightly thick': [1.015, 1.01, 1.005],
  'slightly thick': [1.03, 1.02, 1.01],
  'thin to thick': [1.03, 1.02, 1.01],
  'medium to thick': [1.03, 1.02, 1.01],
  'thin to very thick': [1.035, 1.025, 1.015],
  'thin to extremely thick': [1.07, 1.05, 1.035],
};

/**
 * The girdle factor for a girdle in words and a diameter (for fancy shapes the width) in thousandths
 * of a millimetre; null for words the table doesn't hold.
 */
export function girdleFactor(girdle: string, diameter: number): number | null {
  const words = girdle.trim().toLowerCase().replace(/\s+/g, ' ');
  const row = Object.hasOwn(FACTORS, words) ? FACTORS[words] : undefined;
  if (row === undefined) return null;
  if (diameter < 4150) return row[0];
  return diameter < 7000 ? row[1] : row[2];
}

/** The class of a girdle measured in thousandths of a millimetre (the same course, 11.09). */
export function girdleClass(thickness: number): string {
  if (thickness < 150) return 'thin';
  if (thickness <= 200) return 'medium';
  if (thickness <= 230) return 'slightly thick';
  if (thickness <= 330) return 'thick';
  return thickness <= 400 ? 'very thick' : 'extremely thick';
}
