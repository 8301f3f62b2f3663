import type { MemoLine } from '@foldwell/contracts';
import {
  piecesFollowing,
  readCarats,
  readPieces,
  type Reading,
  type Step,
} from '@foldwell/quantities';

/** What is typed beside the balance, as typed. */
export interface WeighForm {
  found: string;
  pieces: string;
  report: string;
  coming: string;
  comingPieces: string;
}

export const EMPTY_FORM: WeighForm = {
  found: '',
  pieces: '',
  report: '',
  coming: '',
  comingPieces: '',
};

/** The form as numbers, in thousandths of a carat; `why` where something typed can't be read. */
export interface WeighRead {
  found: number | null;
  pieces: number | null;
  /** What is to come back this time, and what of the line is then left. */
  coming: { weight: number; pieces: number };
  rest: { weight: number; pieces: number };
  why: string | null;
}

const zeroOr = (text: string, read: (text: string) => Reading<number>): Reading<number> =>
  /^0+([.,]0+)?$/.test(text) ? { kind: 'ok', value: 0 } : read(text);

/** Reads the form for a line; a field left empty means all that is out. */
export function readWeighForm(form: WeighForm, line: MemoLine, step: Step): WeighRead {
  const whys: string[] = [];
  const read = (text: string, reader: (text: string) => Reading<number>): number | null => {
    if (text.trim() === '') return null;
    const reading = zeroOr(text.trim(), reader);
    if (reading.kind === 'ok') return reading.value;
    whys.push(reading.why);
    return null;
  };
  const out = { weight: line.flows.out, pieces: line.outPieces };
  const found = read(form.found, (text) => readCarats(text, step, 'Found'));
  const pieces = read(form.pieces, readPieces);
  const weight = read(form.coming, (text) => readCarats(text, step, 'Comes back')) ?? out.weight;
  const follows =
    line.isEstimated && weight < out.weight ? piecesFollowing(weight, out) : out.pieces;
  const coming = { weight, pieces: read(form.comingPieces, readPieces) ?? follows };
  if (weight > out.weight) whys.push('More than is out can’t be expected.');
  return {
    found,
    pieces,
    coming,
    rest: { weight: out.weight - weight, pieces: out.pieces - coming.pieces },
    why: whys[0] ?? null,
  };
}
