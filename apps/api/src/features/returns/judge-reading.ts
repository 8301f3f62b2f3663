import type { WeighBackRequest, WeighedBack } from '@foldwell/contracts';
import { parcelAgrees, stoneAgrees } from '@foldwell/ledger';

/** A line as the desk judges it; weights in thousandths of a carat. */
export interface Expected {
  kind: 'stone' | 'pair' | 'parcel';
  isEstimated: boolean;
  report: string;
  out: number;
  outPieces: number;
  /** Signed sum of restatements on the line so far. */
  restated: number;
  stoneTolerance: number;
  parcelTolerance: number;
}

export interface Judged {
  outcome: WeighedBack['outcome'];
  /** Pieces that came back, following the weight where they were not counted. */
  pieces: number;
}

/** What a reading means, before anything is posted. */
export function judgeReading(line: Expected, reading: WeighBackRequest): Judged {
  if (reading.decision === 'not found') return { outcome: 'not found', pieces: 0 };
  return line.kind === 'parcel' ? judgeParcel(line, reading) : judgeStone(line, reading);
}

/** A stone agrees by number and weight; where one disagrees the person says whose it is. */
function judgeStone(
  line: Expected,
  { weight, pieces, reportRead, decision }: WeighBackRequest,
): Judged {
  const isOtherNumber =
    Boolean(reportRead && line.report) &&
    !line.report.toUpperCase().endsWith((reportRead ?? '').trim().toUpperCase());
  const isOtherWeight = !stoneAgrees(line.out, weight, line.stoneTolerance);
  const isShort = pieces !== undefined && pieces < line.outPieces;
  if (decision === 'not ours') return { outcome: 'suspected switch', pieces: 0 };
  if (decision === 'ours')
    return { outcome: isOtherWeight ? 'other weight' : 'agrees', pieces: line.outPieces };
  if (isOtherNumber || isOtherWeight || isShort) return { outcome: 'asks', pieces: line.outPieces };
  return { outcome: 'agrees', pieces: line.outPieces };
}

/** A parcel within tolerance is restated; outside it is short or over; counted pieces have no tolerance. */
function judgeParcel(line: Expected, { weight, pieces: counted }: WeighBackRequest): Judged {
  const off = weight - line.out;
  const isInside = parcelAgrees(
    { expected: line.out, restatedBefore: line.restated },
    weight,
    line.parcelTolerance,
  );
  const follow = Math.min(
    line.outPieces,
    Math.max(0, Math.round((line.outPieces * weight) / Math.max(1, line.out))),
  );
  const pieces = counted ?? (line.isEstimated && !isInside && off < 0 ? follow : line.outPieces);
  if (!line.isEstimated && pieces < line.outPieces)
    return { outcome: isInside && off >= 0 ? 'pieces short' : 'short', pieces };
  if (weight === 0) return { outcome: 'not found', pieces: 0 };
  if (isInside) return { outcome: off === 0 ? 'agrees' : 'restated', pieces: line.outPieces };
  return { outcome: off < 0 ? 'short' : 'excess', pieces };
}
