import type { WeighBackRequest } from '@foldwell/contracts';
import type { Quantity } from '@foldwell/ledger';
import { formatCarats, formatPieces, piecesFollowing } from '@foldwell/quantities';

import { ValidationFailed } from '../../http/errors.js';
import type { FoundLine } from './weighed.js';

/** What is to come back this time: all that is out, or the part of a parcel that was named. */
export function comingBack(
  line: FoundLine,
  { expected, expectedPieces }: WeighBackRequest,
): Quantity {
  const out = { weight: line.flows.out, pieces: line.outPieces };
  if (expected === undefined || expected === out.weight) return out;
  if (line.lotKind !== 'parcel') throw odd('expected', 'A stone, pair or set comes back whole.');
  if (expected > out.weight)
    throw odd('expected', `Only ${formatCarats(out.weight)} ct of ${line.lot} is out.`);
  if (expectedPieces === undefined && !line.isEstimated)
    throw odd('expectedPieces', 'Its pieces are counted: say how many are to come.');
  const pieces = expectedPieces ?? piecesFollowing(expected, out);
  if (pieces >= out.pieces && !line.isEstimated)
    throw odd(
      'expectedPieces',
      `${formatPieces(out.pieces)} are out; some stay out with the rest.`,
    );
  return { weight: expected, pieces: Math.min(pieces, out.pieces) };
}

const odd = (field: string, message: string) => new ValidationFailed([{ field, message }]);
