import { IsInt, IsNumber, Length, Max, Min } from 'class-validator';

import { IsAmount, IsDay, IsWords, Optional } from './fields.js';

export class ChangeHouseRequest {
  @Optional() @IsInt() @Min(0) @Max(1000) stoneTolerance?: number;
  @Optional() @IsInt() @Min(0) @Max(10_000) parcelTolerance?: number;
  @Optional() @IsInt() @Min(0) @Max(100) formulaPercent?: number;
  @Optional() @IsInt() @Min(0) @Max(1_000_000) acceptLimit?: number;
  @Optional() @IsInt() @Min(0) @Max(1_000_000) writeOffLimit?: number;
  @Optional() @IsInt() @Min(0) @Max(3650) memoDays?: number;
  @Optional() @IsInt() @Min(0) @Max(100) depositPercent?: number;
  @Optional() @IsAmount() firstLimit?: number;
  @Optional() @IsAmount() insuredTo?: number | null;
  @Optional() @IsDay() lockDate?: string | null;
  @Optional() @IsWords(4000) memoText?: string;
  @Optional() @IsWords(4000) warrantyText?: string;
}

export class SetRateRequest {
  @Length(3, 3, { message: 'A currency has three letters.' }) currency!: string;
  @IsDay() onDate!: string;
  /** Units of the base currency for one unit. */
  @IsNumber({ maxDecimalPlaces: 8 }, { message: 'The rate is not a number with up to 8 decimals.' })
  @Min(1e-8)
  @Max(1e10)
  rate!: number;
}

export class StartSeriesRequest {
  @IsInt() @Min(1) @Max(1_000_000_000) first!: number;
}

export interface House extends Required<ChangeHouseRequest> {
  name: string;
  town: string;
  zone: string;
  step: 1 | 10;
  baseCurrency: string;
  priceCurrency: string;
  isDemo: boolean;
  memoTextVersion: number;
  today: string;
  version: number;
  rates: { currency: string; onDate: string; rate: string; by: string | null }[];
  series: { series: string; mark: string; lastUsed: number | null; next: number; gaps: number }[];
}
