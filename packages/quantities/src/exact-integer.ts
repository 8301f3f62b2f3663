declare const brand: unique symbol;
/** A number that only its own maker can make, so that carats and cents never mix by accident. */
export type Brand<T, Name extends string> = T & { readonly [brand]: Name };

/** Refuses what isn't a whole number a double can hold exactly. Throws on a bug, not on user text. */
export function exactInteger(value: number, what: string): number {
  if (!Number.isSafeInteger(value)) throw new RangeError(`${what} is not a whole number: ${value}`);
  return value === 0 ? 0 : value;
}
