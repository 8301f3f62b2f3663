import { formatCarats } from '@foldwell/quantities';

import { ValidationFailed } from '../../http/errors.js';
import type { Context } from '../../http/route.js';

/** A weight as it was asked for, in thousandths of a carat, and the field it stands in. */
export interface AskedWeight {
  field: string;
  weight: number;
}

/** Refuses weights that the house's balance can't read, one sentence for each field. */
export async function refuseOutOfStep(
  { db }: Pick<Context, 'db'>,
  asked: AskedWeight[],
): Promise<void> {
  const [house] = await db.query<{ step: number }[]>('SELECT step FROM house');
  const step = house?.step ?? 10;
  const fields = asked
    .filter(({ weight }) => weight % step !== 0)
    .map(({ field, weight }) => ({
      field,
      message: `${formatCarats(weight)} ct has three decimals; this house’s balance reads to 0.01 ct.`,
    }));
  if (fields.length > 0) throw new ValidationFailed(fields);
}

/** The weights of lines, each named by its place in the request. */
export function weightsOf(lines: { weight: number }[]): AskedWeight[] {
  return lines.map(({ weight }, index) => ({ field: `lines.${index}.weight`, weight }));
}
