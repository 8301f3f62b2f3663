/**
 * The GS1 check digit of a number without it: from the right, weights 3, 1, 3 …; what is missing to
 * the next ten (GS1 India, "How to calculate the Check Digit"). Throws a RangeError where it isn't digits.
 */
export function gs1CheckDigit(digits: string): number {
  if (!/^\d+$/.test(digits)) throw new RangeError('a GS1 number is digits alone');
  const sum = [...digits]
    .reverse()
    .reduce((total, digit, index) => total + Number(digit) * (index % 2 === 0 ? 3 : 1), 0);
  return (10 - (sum % 10)) % 10;
}
