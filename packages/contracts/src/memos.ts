import { Type } from 'class-transformer';
import {
  ArrayMaxSize,
  ArrayMinSize,
  IsArray,
  IsBoolean,
  IsInt,
  IsString,
  Max,
  MaxLength,
  Min,
  ValidateNested,
} from 'class-validator';

import { IsAmount, IsDay, IsPieces, IsWeight, IsWords, Optional } from './fields.js';

export class MemoLineRequest {
  @IsWords(20) lot!: string;
  @IsWeight() weight!: number;
  @IsPieces() pieces!: number;
  /** Minor units of the memo's currency for a carat, or a sum agreed for the line. */
  @Optional() @IsAmount() price?: number;
  @Optional() @IsAmount() sum?: number;
  /** Where it comes from; the place that holds most of it where none is named. */
  @Optional() @IsWords(20) place?: string;
  @Optional() @IsWords(400) remarks?: string;
}

export class BookMemoRequest {
  /** Customer by number. */
  @IsWords(20) party!: string;
  @IsDay() due!: string;
  @Optional() @IsDay() pricesUntil?: string;
  @Optional() @IsDay() businessDate?: string;
  @Optional() @IsWords(200) handedTo?: string;
  @Optional() @IsWords(200) carriedBy?: string;
  @Optional() @IsWords(400) terms?: string;
  @Optional() @IsWords(2000) remarks?: string;
  @Optional() @IsInt() @Min(0) @Max(100) depositPercent?: number;
  @Optional() @IsWords(20) draftId?: string;
  /** An owner's reason to book it over a limit or with lapsed papers. */
  @Optional() @IsWords(400) releaseReason?: string;
  @IsArray()
  @ArrayMinSize(1, { message: 'A memo needs at least one line.' })
  @ArrayMaxSize(500)
  @ValidateNested({ each: true })
  @Type(() => MemoLineRequest)
  lines!: MemoLineRequest[];
}

export class ReasonRequest {
  @IsWords(400) reason!: string;
}

export class ExtendMemoRequest {
  @IsDay() due!: string;
  @Optional() @IsDay() pricesUntil?: string;
  @IsWords(400) reason!: string;
  /** Only these lines; the whole memo without. */
  @Optional()
  @IsArray()
  @ArrayMaxSize(500)
  @IsString({ each: true })
  @MaxLength(20, { each: true })
  lots?: string[];
}

export class NewPrice {
  @IsWords(20) lot!: string;
  @Optional() @IsAmount() price?: number;
  @Optional() @IsAmount() sum?: number;
}

export class RePriceMemoRequest {
  @IsWords(400) reason!: string;
  @IsArray()
  @ArrayMinSize(1)
  @ArrayMaxSize(500)
  @ValidateNested({ each: true })
  @Type(() => NewPrice)
  lines!: NewPrice[];
}

export class HandOverRequest {
  @IsWords(20) party!: string;
  @IsDay() due!: string;
  @Optional() @IsWords(400) reason?: string;
  @Optional() @IsWords(400) releaseReason?: string;
}

export class KeepLine {
  @IsWords(20) lot!: string;
  @IsWeight() weight!: number;
  @IsPieces() pieces!: number;
  @Optional() @IsAmount() price?: number;
  @Optional() @IsAmount() sum?: number;
}

export class KeepRequest {
  @Optional() @IsDay() businessDate?: string;
  @IsArray()
  @ArrayMinSize(1)
  @ArrayMaxSize(500)
  @ValidateNested({ each: true })
  @Type(() => KeepLine)
  lines!: KeepLine[];
}

export class WordsRequest {
  @IsWords(2000) words!: string;
  @Optional() @IsBoolean() isTheirs?: boolean;
}

/** Flows of a memo, thousandths of a carat: what is out, came back, was kept, is missing, was restated, was sent. */
export interface MemoFlows {
  out: number;
  returned: number;
  kept: number;
  missing: number;
  writtenOff: number;
  converted: number;
  restated: number;
  sent: number;
}

export interface MemoRow {
  number: string;
  party: string;
  partyNumber: string;
  date: string;
  due: string;
  lots: number;
  flows: MemoFlows;
  value: number;
  currency: string;
  state: 'open' | 'part settled' | 'settled' | 'void';
  differences: number;
}

export interface MemoLine {
  lineId: string;
  lot: string;
  lotKind: 'stone' | 'pair' | 'parcel';
  what: string;
  report: string;
  isEstimated: boolean;
  sentPieces: number;
  outPieces: number;
  keptPieces: number;
  flows: MemoFlows;
  price: number | null;
  sum: number | null;
  pricedWeight: number;
  valueOut: number;
  due: string | null;
  differenceId: string | null;
  /** The last reading taken of it, thousandths of a carat. */
  found: number | null;
  foundPieces: number | null;
  weighing: number | null;
  ledgerWeight: number;
}

export interface MemoDetail extends MemoRow {
  id: string;
  by: string;
  handedTo: string;
  carriedBy: string;
  terms: string;
  remarks: string;
  pricesUntil: string | null;
  depositPercent: number | null;
  stoneTolerance: number;
  parcelTolerance: number;
  insuredTo: number | null;
  lines: MemoLine[];
  differenceList: DifferenceRow[];
  words: { at: string; words: string; by: string; isTheirs: boolean }[];
  papers: { kind: string; number: string; date: string }[];
  otherMemos: { number: string; out: number; due: string }[];
  /** Why it can't be void; null where it can. */
  voidRefusal: string | null;
  previous: string | null;
  next: string | null;
}

export interface DifferenceRow {
  id: string;
  lot: string;
  what: string;
  memo: string | null;
  party: string | null;
  kind: 'short' | 'pieces short' | 'not found' | 'excess' | 'other weight' | 'suspected switch';
  expected: number;
  found: number;
  expectedPieces: number;
  foundPieces: number;
  /** Held in missing. */
  held: number;
  heldPieces: number;
  tolerance: number;
  openedBy: string;
  openedById: string;
  openedOn: string;
  askedAt: string | null;
  answer: string | null;
  /** Who else may answer it. */
  answerers: string[];
  value: number;
  currency: string;
  cameLot: string | null;
}

export interface BookedMemo {
  number: string;
  movementId: string;
  memoId: string;
}
