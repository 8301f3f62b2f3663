import { IsBoolean, IsEmail, IsInt, Length, Max, Min, ValidateIf } from 'class-validator';

import { IsAmount, IsDay, IsWords, Optional } from './fields.js';
import type { Exposure } from './exposure.js';
import type { MemoRow } from './memos.js';

class PartyFields {
  @Optional() @IsBoolean() isCustomer?: boolean;
  @Optional() @IsBoolean() isSupplier?: boolean;
  @Optional() @IsBoolean() isConsignor?: boolean;
  @Optional() @IsBoolean() isBroker?: boolean;
  @Optional() @IsBoolean() isLaboratory?: boolean;
  @Optional() @IsBoolean() isWorkshop?: boolean;
  @Optional() @IsWords(100) town?: string;
  @Optional() @IsWords(100) country?: string;
  @Optional() @IsWords(400) address?: string;
  @Optional()
  @ValidateIf((party: PartyFields) => party.email !== '')
  @IsEmail({}, { message: 'That is not an e-mail address.' })
  email?: string;
  @Optional() @IsWords(60) phone?: string;
  @Optional() @IsWords(100) contact?: string;
  @Optional() @IsWords(60) taxNumber?: string;
  @Optional() @Length(3, 3, { message: 'A currency has three letters.' }) currency?: string;
  @Optional() @IsInt() @Min(0) @Max(3650) memoDays?: number;
  @Optional() @IsInt() @Min(0) @Max(3650) paymentDays?: number;
  @Optional() @IsWords(200) terms?: string;
  @Optional() @IsAmount() creditLimit?: number | null;
  @Optional() @IsAmount() memoLimit?: number | null;
  @Optional() @IsDay() identityPapersUntil?: string | null;
  @Optional() @IsDay() resaleCertificateUntil?: string | null;
  @Optional() @IsDay() sanctionsCheckedOn?: string | null;
  @Optional() @IsBoolean() isMuted?: boolean;
  @Optional() @IsWords(2000) note?: string;
}

/** What is changed about a party; only what is given. */
export class ChangePartyRequest extends PartyFields {
  @Optional() @IsWords(200) name?: string;
}

export class AddPartyRequest extends PartyFields {
  @IsWords(200) name!: string;
}

export interface PartyRow {
  number: string;
  name: string;
  town: string;
  parts: string[];
  exposure: Exposure;
  memosOpen: number;
  late: number;
  out: number;
  papers: string | null;
}

export interface PartyDetail extends PartyRow {
  version: number;
  particulars: Required<
    Omit<
      ChangePartyRequest,
      'isCustomer' | 'isSupplier' | 'isConsignor' | 'isBroker' | 'isLaboratory' | 'isWorkshop'
    >
  >;
  memos: MemoRow[];
  holds: {
    lot: string;
    what: string;
    memo: string;
    pieces: number;
    weight: number;
    value: number;
    due: string;
  }[];
  /** Of what we sent over all memos: what was kept, in thousandths of a carat; days out on average. */
  keeps: { sent: number; kept: number; memos: number; daysOut: number | null; differences: number };
}
