/** Digits in groups of three: `1871870` is `1,871,870`. */
export function grouped(digits: string): string {
  return digits.replace(/\B(?=(\d{3})+(?!\d))/g, ',');
}
