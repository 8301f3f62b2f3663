import type { Legs, LotRef, DifferenceRef } from '@foldwell/ledger';

/** What the database's writer takes: see write_movement in the migrations for each part's meaning. */
export interface Act extends Partial<Legs> {
  kind: string | null;
  word?: string;
  businessDate?: string | undefined;
  reason?: string | undefined;
  paper?: string | undefined;
  partyId?: string | undefined;
  memoId?: number;
  reverses?: number;
  newLots?: Record<string, unknown>[];
  newPlaces?: {
    ref: string;
    kind: string;
    name: string;
    partyId: string;
    due?: string | undefined;
  }[];
  newMemo?: Record<string, unknown>;
  newDifferences?: NewDifference[];
  answers?: { differenceId: number; answer: string; reason?: string | undefined }[];
  weighings?: NewWeighing[];
  keeps?: {
    lineId: number;
    weight: number;
    pieces: number;
    price?: number | null;
    agreedSum?: number | null;
    amount: number;
  }[];
  memoChange?: Record<string, unknown>;
  document?: { kind: string; snapshot: unknown };
  draftId?: string | undefined;
  releaseReason?: string | undefined;
  audit?: { action?: string; subject?: string; detail?: object };
}

export interface NewDifference {
  ref: string;
  lot: LotRef;
  lineId?: number;
  kind: string;
  expectedWeight: number;
  foundWeight: number;
  expectedPieces: number;
  foundPieces: number;
  cameLot?: LotRef;
}

export interface NewWeighing {
  lot: LotRef;
  purpose: 'taken in' | 'return' | 'again' | 'transfer' | 'check';
  weight: number;
  pieces?: number | undefined;
  reportRead?: string | undefined;
  lineId?: number;
  difference?: DifferenceRef;
}

/** What the writer answers, and gives again for the same key. */
export interface Written {
  movementId: number | null;
  memoId: number | null;
  memoNumber: number | null;
  businessDate: string;
  lots: Record<string, { id: number; number: string }>;
  differences: Record<string, number>;
  weighings: number[];
  document: { id: number; number: string } | null;
}
