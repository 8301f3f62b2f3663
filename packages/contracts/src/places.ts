import { IsBoolean, IsIn } from 'class-validator';

import { IsWords, Optional } from './fields.js';

export class AddPlaceRequest {
  @IsIn(['drawer', 'show', 'person', 'laboratory', 'workshop'], {
    message: 'A place is a drawer, a show, a person, a laboratory or a workshop.',
  })
  kind!: 'drawer' | 'show' | 'person' | 'laboratory' | 'workshop';
  @IsWords(60) name!: string;
  @Optional() @IsWords(20) safe?: string;
  @Optional() @IsWords(200) purpose?: string;
  @Optional() @IsWords(20) party?: string;
  @Optional() @IsWords(20) person?: string;
}

export class ChangePlaceRequest {
  @Optional() @IsWords(200) purpose?: string;
  @Optional() @IsBoolean() isClosed?: boolean;
}

export interface PlaceRow {
  id: string;
  kind: string;
  name: string;
  safe: string;
  /** `Safe B7`, `With I. Tarn`, as said. */
  words: string;
  purpose: string;
  isClosed: boolean;
  lots: number;
  weight: number;
}
