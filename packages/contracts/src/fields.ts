import 'reflect-metadata/lite';
import { applyDecorators } from './apply-decorators.js';
import { IsInt, IsOptional, IsString, Matches, Max, MaxLength, Min } from 'class-validator';

/** Thousandths of a carat, positive. */
export const IsWeight = () =>
  applyDecorators(
    IsInt({ message: '$property is not a weight in thousandths of a carat.' }),
    Min(1, { message: '$property needs carats.' }),
    Max(100_000_000_000, { message: '$property is more than a house can hold.' }),
  );

/** A reading of the balance: zero is a reading too. */
export const IsReading = () =>
  applyDecorators(
    IsInt({ message: '$property is not a weight in thousandths of a carat.' }),
    Min(0, { message: '$property is less than nothing.' }),
    Max(100_000_000_000, { message: '$property is more than a house can hold.' }),
  );

/** A count of stones; zero where nothing came. */
export const IsPieces = (least: 0 | 1 = 1) =>
  applyDecorators(
    IsInt({ message: '$property is not a whole number of pieces.' }),
    Min(least, { message: '$property needs at least one stone.' }),
    Max(1_000_000_000, { message: '$property is more than a parcel can hold.' }),
  );

/** Whole minor units of a currency, not negative. */
export const IsAmount = () =>
  applyDecorators(
    IsInt({ message: '$property is not an amount in minor units.' }),
    Min(0, { message: '$property is less than nothing.' }),
    Max(100_000_000_000_000, { message: '$property is more than can be booked.' }),
  );

/** A calendar day, `yyyy-MM-dd`. */
export const IsDay = () =>
  Matches(/^\d{4}-(0[1-9]|1[0-2])-(0[1-9]|[12]\d|3[01])$/, {
    message: '$property is not a day, such as 2026-12-15.',
  });

/** Text without control characters, of a length. */
export const IsWords = (most = 200) =>
  applyDecorators(
    IsString({ message: '$property is not text.' }),
    MaxLength(most, { message: `$property is longer than ${most} characters.` }),
    // Tab and line breaks may stay; NUL and the other controls, and marks that turn the writing direction, may not.
    Matches(
      /^[^\u0000-\u0008\u000b\u000c\u000e-\u001f\u007f\u202a-\u202e\u2066-\u2069\ud800-\udfff]*$/u,
      { message: '$property holds characters that can’t be printed.' },
    ),
  );

export const Optional = IsOptional;
