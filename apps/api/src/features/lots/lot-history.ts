import type { Bar, LotEntry } from '@foldwell/contracts';
import { formatCarats } from '@foldwell/quantities';
import type { DataSource } from 'typeorm';

interface MovementRecord {
  id: string;
  kind: string;
  word: string | null;
  date: string;
  at: Date;
  who: string;
  reason: string;
  memo: string | null;
  party: string | null;
  paper: string;
  is_undone: boolean;
  postings: { part: keyof Bar | null; weight: number; kind: string }[];
}

/** What happened to a lot, newest first, with its bar after each entry; edits of its particulars among them. */
export async function entriesOf(db: DataSource, lotId: string): Promise<LotEntry[]> {
  const movements = await db.query<MovementRecord[]>(
    `SELECT m.id, m.kind, m.word, m.business_date::text AS date, m.at, w.name AS who, m.reason, o.number AS memo,
       coalesce(y.name, '') AS party, m.paper, EXISTS (SELECT 1 FROM movement u WHERE u.reverses = m.id) AS is_undone,
       (SELECT json_agg(json_build_object('part', p.part, 'weight', g.weight, 'kind', p.kind) ORDER BY g.id)
          FROM posting g JOIN place p ON p.id = g.place_id WHERE g.movement_id = m.id AND g.lot_id = $1) AS postings
     FROM movement m JOIN person w ON w.id = m.person_id LEFT JOIN memo o ON o.id = m.memo_id LEFT JOIN party y ON y.id = m.party_id
     WHERE m.id IN (SELECT movement_id FROM posting WHERE lot_id = $1) ORDER BY m.id`,
    [lotId],
  );
  const after: Bar = { safe: 0, out: 0, returned: 0, sold: 0, missing: 0 };
  const entries = movements.map((movement): LotEntry & { order: Date } => {
    for (const { part, weight } of movement.postings) if (part) after[part] += weight;
    const arrived = movement.postings.filter((posting) => posting.part && posting.weight > 0);
    return {
      movementId: movement.is_undone || movement.kind === 'reversal' ? null : movement.id,
      date: movement.date,
      at: movement.at.toISOString(),
      who: movement.who,
      what: sentence(movement),
      moved: arrived.reduce((sum, posting) => sum + posting.weight, 0),
      to: arrived.at(-1)?.part ?? null,
      after: { ...after },
      order: movement.at,
    };
  });
  const changes = await changesOf(db, lotId, after);
  return [...entries, ...changes]
    .sort((a, b) => b.order.getTime() - a.order.getTime())
    .map(({ order: _order, ...entry }) => entry);
}

async function changesOf(
  db: DataSource,
  lotId: string,
  now: Bar,
): Promise<(LotEntry & { order: Date })[]> {
  const changes = await db.query<
    { at: Date; who: string; field: string; was: unknown; became: unknown; date: string }[]
  >(
    `SELECT c.at, c.at::date::text AS date, w.name AS who, c.field, c.was, c.became FROM lot_change c JOIN person w ON w.id = c.person_id WHERE c.lot_id = $1`,
    [lotId],
  );
  return changes.map(({ at, date, who, field, was, became }) => ({
    movementId: null,
    date,
    at: at.toISOString(),
    who,
    what: `${fieldWords(field)} changed from ${said(field, was)} to ${said(field, became)}`,
    moved: 0,
    to: null,
    after: { ...now },
    order: at,
  }));
}

const fieldWords = (field: string) =>
  (field[0]?.toUpperCase() ?? '') +
  field
    .slice(1)
    .replace(/[A-Z]/g, (letter) => ` ${letter.toLowerCase()}`)
    .replaceAll('_', ' ');
const said = (field: string, value: unknown) => {
  if (value === null || value === '' || value === undefined) return 'nothing';
  if (/price/.test(field)) return `${(Number(value) / 100).toLocaleString('en-US')} per ct`;
  if (/stated/.test(field)) return `${formatCarats(Number(value))} ct`;
  return typeof value === 'string' ? value : JSON.stringify(value);
};

function sentence({
  kind,
  word,
  memo,
  party,
  reason,
  paper,
  is_undone: isUndone,
}: MovementRecord): string {
  const on = memo ? ` M ${memo}` : '';
  const words: Record<string, string> = {
    opening: 'Opening stock',
    purchase: `Bought from ${party}${paper && `, ${paper}`}`,
    'consignment in': `Consigned in by ${party}${paper && `, ${paper}`}`,
    transfer: 'Moved between places',
    'memo out': `Out on${on} to ${party}`,
    'memo return': `Weighed back from${on}`,
    'memo void': `Void:${on}`,
    'put away': 'Put away',
    kept: `Kept from${on}`,
    'un-kept': `On memo again,${on}`,
    'difference opened': `Difference opened on${on}`,
    'difference answered': `Difference answered${on && ` on${on}`}`,
    conversion: `Parcel worked: ${word}`,
    reversal: 'Undone',
  };
  const said = words[kind] ?? `${kind[0]?.toUpperCase()}${kind.slice(1)}`;
  return [said, reason, isUndone && 'undone since'].filter(Boolean).join(', ');
}
