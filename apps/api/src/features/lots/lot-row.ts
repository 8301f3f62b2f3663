import type { Bar, LotRow } from '@foldwell/contracts';
import {
  CLARITIES,
  COLOURS,
  daysBetween,
  lineAmount,
  MAKE_MARKS,
  type Origin,
  rangeWords,
} from '@foldwell/quantities';

import { placeWords } from '../places/place-words.js';

/** A lot as SELECT_LOT gives it. */
export interface LotRecord {
  id: string;
  number: string;
  kind: LotRow['kind'];
  shape: string;
  sieve_from: string;
  sieve_to: string;
  part_safe: string;
  part_out: string;
  part_returned: string;
  part_sold: string;
  part_missing: string;
  part_pieces: string;
  whole: string;
  is_estimated: boolean;
  colour_from: number | null;
  colour_to: number | null;
  fancy_colour: string;
  clarity_from: number | null;
  clarity_to: number | null;
  cut: number | null;
  polish: number | null;
  symmetry: number | null;
  fluorescence: string;
  report_laboratory: string;
  report_number: string;
  origin: Origin;
  treatment: string;
  owner: string | null;
  ask_price: string | null;
  stated_weight: string | null;
  cost: string | null;
  version: number;
  places: {
    kind: string;
    name: string;
    safe: string;
    memo: string | null;
    party: string | null;
    due: string | null;
  }[];
  differs: string | null;
}

/** All that a row needs; the places only of the rows that are shown. */
export const SELECT_LOT = `
  SELECT l.*, o.name AS owner,
    (SELECT coalesce(sum(b.cost), 0) FROM balance b WHERE b.lot_id = l.id AND b.inside) AS cost,
    coalesce((SELECT json_agg(json_build_object('kind', p.kind, 'name', p.name, 'safe', p.safe, 'memo', m.number,
        'party', y.name, 'due', coalesce(n.due, m.due)) ORDER BY b.weight DESC)
      FROM balance b JOIN place p ON p.id = b.place_id LEFT JOIN memo m ON m.id = p.memo_id
      LEFT JOIN memo_line n ON n.memo_id = m.id AND n.lot_id = b.lot_id
      LEFT JOIN party y ON y.id = coalesce(m.party_id, p.party_id)
      WHERE b.lot_id = l.id AND p.part IS NOT NULL AND (b.weight > 0 OR b.pieces > 0)), '[]') AS places,
    (SELECT d.kind FROM difference d WHERE d.lot_id = l.id AND d.answer IS NULL LIMIT 1) AS differs
  FROM lot l LEFT JOIN party o ON o.id = l.owner_party_id`;

/** The five parts of a lot's bar. */
export function barOf(
  lot: Pick<LotRecord, 'part_safe' | 'part_out' | 'part_returned' | 'part_sold' | 'part_missing'>,
): Bar {
  return {
    safe: Number(lot.part_safe),
    out: Number(lot.part_out),
    returned: Number(lot.part_returned),
    sold: Number(lot.part_sold),
    missing: Number(lot.part_missing),
  };
}

/** A lot as the table shows it; cost only for who may see it. */
export function lotRow(lot: LotRecord, today: string, seesCost: boolean): LotRow {
  const ask = lot.ask_price === null ? null : Number(lot.ask_price);
  const priced =
    lot.stated_weight !== null && lot.kind === 'stone'
      ? Number(lot.stated_weight)
      : Number(lot.whole);
  return {
    id: lot.id,
    number: lot.number,
    kind: lot.kind,
    shape: lot.shape,
    sieve: sieveWords(lot),
    pieces: Number(lot.part_pieces),
    isEstimated: lot.is_estimated,
    weight: Number(lot.whole),
    colour: lot.fancy_colour || rangeWords(COLOURS, lot.colour_from, lot.colour_to),
    clarity: rangeWords(CLARITIES, lot.clarity_from, lot.clarity_to),
    make: makeWords(lot),
    fluorescence: lot.fluorescence,
    report: `${lot.report_laboratory} ${lot.report_number}`.trim(),
    origin: lot.origin,
    treatment: lot.treatment,
    owner: lot.owner,
    ask,
    total: ask === null ? null : lineAmount(ask, priced),
    bar: barOf(lot),
    ...whereabouts(lot, today),
    ...(seesCost && { cost: Number(lot.cost ?? 0) }),
  };
}

/** `+2 −6.5`, as plates are said. */
export function sieveWords({
  sieve_from: from,
  sieve_to: to,
}: Pick<LotRecord, 'sieve_from' | 'sieve_to'>): string {
  return [from && `+${from}`, to && `−${to}`].filter(Boolean).join(' ');
}

function makeWords({ cut, polish, symmetry }: LotRecord): string {
  if (cut === null && polish === null && symmetry === null) return '';
  return [cut, polish, symmetry]
    .map((rank) => (rank === null ? '–' : MAKE_MARKS[rank - 1]))
    .join(' ');
}

function whereabouts(lot: LotRecord, today: string): Pick<LotRow, 'place' | 'tone'> {
  const [first, ...others] = lot.places;
  if (lot.differs)
    return { place: `${first ? placeWords(first) : 'Missing'}, to answer`, tone: 'differs' };
  if (!first) return { place: 'not in the house', tone: 'plain' };
  const late = lot.places.find(
    (place) => place.kind === 'memo' && place.due && daysBetween(place.due, today) > 0,
  );
  if (late?.due)
    return {
      place: `late ${daysBetween(late.due, today)} d, M ${late.memo} ${late.party}`,
      tone: 'late',
    };
  return {
    place:
      others.length > 1 ? `${lot.places.length} places` : lot.places.map(placeWords).join(', '),
    tone: 'plain',
  };
}

/** What a lot is, in a line: `Round 1.03 G VS2, Norvane 21180453` or `Parcel round +2 −6.5, F–G VS`. */
export function whatWords(row: LotRow, carats = ''): string {
  const grade = [row.colour, row.clarity].filter(Boolean).join(' ');
  if (row.kind === 'parcel') {
    return [`Parcel ${row.shape.toLowerCase()} ${row.sieve}`.trim().replace(/\s+/g, ' '), grade]
      .filter(Boolean)
      .join(', ');
  }
  const name = [
    row.kind === 'pair' ? `Pair ${row.shape.toLowerCase()}` : row.shape || 'Stone',
    carats,
    grade,
  ]
    .filter(Boolean)
    .join(' ');
  return row.report ? `${name}, ${row.report}` : `${name}, no report`;
}
