import { IsArray, ArrayMaxSize, ArrayMinSize, IsIn, ValidateNested } from 'class-validator';
import { Type } from 'class-transformer';

import { IsDay, IsPieces, IsReading, IsWeight, IsWords, Optional } from './fields.js';
import { TransferLine } from './lots.js';

/** One Enter at the return desk: what was read of one line. */
export class WeighBackRequest {
  @IsWords(20) lot!: string;
  @IsReading() weight!: number;
  /** Counted; an estimated parcel's pieces follow its weight where left out. */
  @Optional() @IsPieces(0) pieces?: number;
  /** What of a parcel comes back this time; the rest stays out. All that is out where left out. */
  @Optional() @IsWeight() expected?: number;
  /** Its pieces; of an estimated parcel they follow the weight where left out. */
  @Optional() @IsPieces() expectedPieces?: number;
  @Optional() @IsWords(60) reportRead?: string;
  /** Where reading or number disagree: whose stone lies on the balance. */
  @Optional() @IsIn(['ours', 'not ours', 'not found']) decision?: 'ours' | 'not ours' | 'not found';
  @Optional() @IsDay() businessDate?: string;
}

export class WeighAgainRequest {
  @IsReading() weight!: number;
  @Optional() @IsPieces(0) pieces?: number;
}

export class PutAwayRequest {
  /** The drawer it goes to, by id. */
  @IsWords(20) to!: string;
  @Optional() @IsDay() businessDate?: string;
  @IsArray()
  @ArrayMinSize(1)
  @ArrayMaxSize(500)
  @ValidateNested({ each: true })
  @Type(() => TransferLine)
  lines!: TransferLine[];
}

export const ANSWERS = [
  'customer keeps it',
  'accepted',
  'found again',
  'record corrected',
  'our short weighing',
  'their short weighing',
  'written off',
  'other stone',
] as const;

export class AnswerRequest {
  @IsIn(ANSWERS, { message: 'That is not an answer to a difference.' })
  answer!: (typeof ANSWERS)[number];
  @Optional() @IsWords(400) reason?: string;
  @Optional() @IsDay() businessDate?: string;
}

/** What one Enter at the desk did, in a few words. */
export interface WeighedBack {
  weighing: number;
  /** `asks` where the person must say whose stone it is before anything is posted. */
  outcome:
    | 'agrees'
    | 'restated'
    | 'short'
    | 'excess'
    | 'pieces short'
    | 'other weight'
    | 'suspected switch'
    | 'not found'
    | 'asks';
  says: string;
}

export interface ReturnsList {
  memos: {
    number: string;
    party: string;
    due: string;
    out: number;
    differences: number;
  }[];
  desk: {
    lot: string;
    what: string;
    memo: string | null;
    pieces: number;
    weight: number;
    placeId: string;
    place: string;
    since: string;
  }[];
}
