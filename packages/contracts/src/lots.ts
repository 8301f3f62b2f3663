import { Type } from 'class-transformer';
import {
  ArrayMaxSize,
  ArrayMinSize,
  IsArray,
  IsBoolean,
  IsIn,
  IsInt,
  IsNumber,
  Max,
  Min,
  ValidateNested,
} from 'class-validator';
import { ORIGINS, type Origin } from '@foldwell/quantities';

import { IsAmount, IsDay, IsPieces, IsWeight, IsWords, Optional } from './fields.js';

/** Where a whole is, in thousandths of a carat; the five parts add up to it. */
export interface Bar {
  safe: number;
  out: number;
  returned: number;
  sold: number;
  missing: number;
}

export class Member {
  @IsWeight() weight!: number;
  @Optional() @IsWords(100) laboratory?: string;
  @Optional() @IsWords(60) report?: string;
  @Optional() @IsWords(200) grades?: string;
}

/** Proportions as stated: % of the mean girdle diameter, degrees. */
export class Proportions {
  @Optional() @IsNumber() @Min(1) @Max(99) table?: number;
  @Optional() @IsNumber() @Min(1) @Max(120) depth?: number;
  @Optional() @IsNumber() @Min(0.1) @Max(80) crownAngle?: number;
  @Optional() @IsNumber() @Min(0.1) @Max(60) crownHeight?: number;
  @Optional() @IsNumber() @Min(0.1) @Max(80) pavilionAngle?: number;
  @Optional() @IsNumber() @Min(0.1) @Max(90) pavilionDepth?: number;
  @Optional() @IsNumber() @Min(0) @Max(30) girdle?: number;
  @Optional() @IsNumber() @Min(0) @Max(30) culet?: number;
  @Optional() @IsNumber() @Min(0) @Max(100) star?: number;
  @Optional() @IsNumber() @Min(0) @Max(100) lowerHalf?: number;
}

/** All that is written about a lot and may be edited, with history; weights are not among it. */
export class ParticularsRequest {
  @Optional() @IsWords(40) shape?: string;
  @Optional() @IsWords(10) sieveFrom?: string;
  @Optional() @IsWords(10) sieveTo?: string;
  @Optional() @IsInt() @Min(1) @Max(23) colourFrom?: number | null;
  @Optional() @IsInt() @Min(1) @Max(23) colourTo?: number | null;
  @Optional() @IsWords(80) fancyColour?: string;
  @Optional() @IsInt() @Min(1) @Max(11) clarityFrom?: number | null;
  @Optional() @IsInt() @Min(1) @Max(11) clarityTo?: number | null;
  @Optional() @IsInt() @Min(1) @Max(5) cut?: number | null;
  @Optional() @IsInt() @Min(1) @Max(5) polish?: number | null;
  @Optional() @IsInt() @Min(1) @Max(5) symmetry?: number | null;
  @Optional() @IsWords(40) fluorescence?: string;
  /** Thousandths of a millimetre. */
  @Optional() @IsInt() @Min(1) @Max(200_000) measureA?: number | null;
  @Optional() @IsInt() @Min(1) @Max(200_000) measureB?: number | null;
  @Optional() @IsInt() @Min(1) @Max(200_000) measureDepth?: number | null;
  @Optional() @IsWeight() statedWeight?: number | null;
  @Optional() @IsWords(100) reportLaboratory?: string;
  @Optional() @IsWords(60) reportNumber?: string;
  @Optional() @IsDay() reportDate?: string | null;
  @Optional() @IsWords(80) miningCountry?: string;
  @Optional() @IsWords(400) miningEvidence?: string;
  @Optional() @IsWords(60) inscription?: string;
  @Optional() @IsWords(60) shade?: string;
  @Optional() @IsWords(2000) comments?: string;
  @Optional() @ValidateNested() @Type(() => Proportions) proportions?: Proportions;
  /** Minor units of the price currency for a carat. */
  @Optional() @IsAmount() ask?: number | null;
  @Optional() @IsAmount() floor?: number | null;
}

export class TakeInLot extends ParticularsRequest {
  @IsIn(['stone', 'pair', 'parcel'], { message: 'A lot is a stone, a pair or set, or a parcel.' })
  kind!: 'stone' | 'pair' | 'parcel';
  @IsWeight() weight!: number;
  @IsPieces() pieces!: number;
  @Optional() @IsBoolean() isEstimated?: boolean;
  @IsIn(ORIGINS, { message: 'Say whether it is natural, laboratory-grown or not tested.' })
  origin!: Origin;
  @Optional() @IsWords(200) treatment?: string;
  /** The place it goes to, by id. */
  @IsWords(20) place!: string;
  /** What it cost, in minor units of the base currency: for a carat, or the sum. */
  @Optional() @IsAmount() price?: number;
  @Optional() @IsAmount() sum?: number;
  @Optional()
  @IsArray()
  @ArrayMaxSize(50)
  @ValidateNested({ each: true })
  @Type(() => Member)
  members?: Member[];
}

export class TakeInRequest {
  @IsIn(['opening', 'purchase', 'consignment in'], {
    message: 'Goods come in as opening stock, bought, or consigned in.',
  })
  how!: 'opening' | 'purchase' | 'consignment in';
  /** Supplier or consignor, by number. */
  @Optional() @IsWords(20) party?: string;
  @Optional() @IsWords(80) paper?: string;
  /** Due back to the consignor. */
  @Optional() @IsDay() due?: string;
  @Optional() @IsDay() businessDate?: string;
  /** One price for all of them, allotted by `shareBy`. */
  @Optional() @IsAmount() boxPrice?: number;
  @Optional() @IsIn(['weight', 'worth']) shareBy?: 'weight' | 'worth';
  @IsArray()
  @ArrayMinSize(1)
  @ArrayMaxSize(500)
  @ValidateNested({ each: true })
  @Type(() => TakeInLot)
  lots!: TakeInLot[];
}

export class TransferLine {
  @IsWords(20) lot!: string;
  @IsWords(20) from!: string;
  @IsWeight() weight!: number;
  @IsPieces() pieces!: number;
}

export class TransferRequest {
  @IsWords(20) to!: string;
  @Optional() @IsDay() businessDate?: string;
  @Optional() @IsWords(400) reason?: string;
  @IsArray()
  @ArrayMinSize(1)
  @ArrayMaxSize(500)
  @ValidateNested({ each: true })
  @Type(() => TransferLine)
  lines!: TransferLine[];
}

export class ReverseRequest {
  @IsWords(400) reason!: string;
}

export class SaveSieveRequest {
  @IsWords(100) name!: string;
  @IsWords(2000) sieve!: string;
}

/** One row of the lot table. Weights in thousandths of a carat, prices in minor units of the price currency. */
export interface LotRow {
  id: string;
  number: string;
  kind: 'stone' | 'pair' | 'parcel';
  shape: string;
  sieve: string;
  pieces: number;
  isEstimated: boolean;
  weight: number;
  colour: string;
  clarity: string;
  make: string;
  fluorescence: string;
  report: string;
  origin: Origin;
  treatment: string;
  owner: string | null;
  ask: number | null;
  total: number | null;
  bar: Bar;
  /** Where it is, in words; `late` and `differs` colour it. */
  place: string;
  tone: 'plain' | 'late' | 'differs';
  cost?: number;
}

export interface LotPage {
  rows: LotRow[];
  next: string | null;
}

/** Sums of all that pass a sieve; counted exactly to 10,000, then `isCapped`. */
export interface LotSum {
  lots: number;
  isCapped: boolean;
  of: number;
  pieces: number;
  weight: number;
  value: number;
  bar: Bar;
  /** What would let some pass where none does. */
  hint: string | null;
  cost?: number;
}

export interface LotPlace {
  placeId: string;
  kind: string;
  part: keyof Bar;
  name: string;
  /** The paper it went on, `M 20587`. */
  paper: string | null;
  since: string;
  due: string | null;
  holder: string;
  pieces: number;
  weight: number;
  price: number | null;
  currency: string | null;
  value: number | null;
  differenceId: string | null;
  cost?: number;
}

export interface LotEntry {
  movementId: string | null;
  date: string;
  at: string;
  who: string;
  what: string;
  moved: number;
  to: keyof Bar | null;
  after: Bar;
}

export interface LotDetail {
  row: LotRow;
  version: number;
  particulars: ParticularsRequest & {
    members?: Member[];
    reports?: { laboratory: string; number: string; standing: string }[];
  };
  takenInOn: string | null;
  source: string | null;
  sourcePaper: string;
  places: LotPlace[];
  papers: { paper: string; number: string; date: string }[];
  history: LotEntry[];
  warnings: string[];
  previous: string | null;
  next: string | null;
  isReversible: { movementId: string; what: string } | null;
}

/** What booking goods in gave. */
export interface TakenIn {
  movementId: string;
  numbers: string[];
  warnings: { number: string; sentences: string[] }[];
}
