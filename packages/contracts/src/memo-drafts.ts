import { Type } from 'class-transformer';
import { ArrayMaxSize, IsArray, IsObject, ValidateNested } from 'class-validator';

import type { Exposure } from './exposure.js';
import { IsWords, Optional } from './fields.js';
import type { Bar } from './lots.js';
import { MemoLineRequest } from './memos.js';

export class DraftRequest {
  /** As typed, whatever state it is in. */
  @IsObject({ message: 'A draft holds what was typed.' }) body!: Record<string, unknown>;
  @Optional() @IsWords(20) party?: string;
}

export class ReadLineRequest {
  @IsWords(200) text!: string;
  @Optional() @IsWords(20) party?: string;
  /** Lots already on the draft, with what of them. */
  @IsArray()
  @ArrayMaxSize(500)
  @ValidateNested({ each: true })
  @Type(() => MemoLineRequest)
  lines!: MemoLineRequest[];
}

/** What Enter would do with a scan line. */
export interface ReadLine {
  line?: DraftLine;
  /** In words, at the right of the field. */
  says: string;
  refusal?: { sentence: string; path: string | null; pathWords: string | null };
  warnings: string[];
}

/** A line as the memo page shows it while it is written; weights in thousandths, money in minor units. */
export interface DraftLine {
  lot: string;
  what: string;
  kind: 'stone' | 'pair' | 'parcel';
  isEstimated: boolean;
  pieces: number;
  weight: number;
  free: number;
  placeId: string;
  placeWords: string;
  price: number | null;
  sum: number | null;
  pricedWeight: number;
  amount: number;
  after: Bar;
}

export interface MemoPreview {
  exposure: Exposure;
  openMemos: { number: string; weight: number; value: number }[];
  thisMemo: number;
  after: number;
  overBy: number;
  overMemoBy: number;
  lapsed: string | null;
  /** Consigned goods on it that are due back to their owner before this memo ends. */
  cautions: string[];
  /** Weight the last parcel line could keep to stay inside, thousandths of a carat. */
  cutLastTo: number | null;
  owners: string[];
  keeps: { sent: number; kept: number; memos: number; daysOut: number | null; differences: number };
}

export interface DraftRow {
  id: string;
  party: string | null;
  by: string;
  at: string;
  lines: number;
  waitsBecause: string;
  body: Record<string, unknown>;
  version: number;
}
