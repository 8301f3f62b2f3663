import type { DraftLine } from '@foldwell/contracts';

/** A memo as it is written, kept as typed. */
export interface MemoDraft {
  party: string;
  due: string;
  pricesUntil: string;
  handedTo: string;
  carriedBy: string;
  terms: string;
  remarks: string;
  scan: string;
  lines: DraftLine[];
}

export const EMPTY_DRAFT: MemoDraft = {
  party: '',
  due: '',
  pricesUntil: '',
  handedTo: '',
  carriedBy: 'Hand, signed for',
  terms: '',
  remarks: '',
  scan: '',
  lines: [],
};

/** Lines as the API books them. */
export const linesToBook = (lines: DraftLine[]) =>
  lines.map(({ lot, weight, pieces, price, sum, placeId }) => ({
    lot,
    weight,
    pieces,
    place: placeId,
    ...(sum === null ? { price: price ?? 0 } : { sum }),
  }));
