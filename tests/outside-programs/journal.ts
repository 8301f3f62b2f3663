import type pg from 'pg';

/** A posting or a balance, in the ledger's own whole numbers, as text. */
interface Sides {
  lot: string;
  place: string;
  weight: string;
  pieces: string;
  cost: string;
}

interface Posting extends Sides {
  movement: string;
  day: string;
  kind: string;
}

/**
 * All postings as a journal that hledger reads. Each lot has three commodities of its own, carats,
 * pieces and cost, so that whoever balances a transaction proves conservation lot by lot.
 */
export async function journalOf(client: pg.Client): Promise<string> {
  const { rows } = await client.query<Posting>(
    `SELECT movement_id::text AS movement, business_date::text AS day, kind, lot_id::text AS lot,
       place_kind || ' ' || place_id AS place, weight::text, pieces::text, cost::text
     FROM posting JOIN movement ON movement.id = movement_id ORDER BY posting.movement_id, posting.id`,
  );
  const text = ['decimal-mark .'];
  let movement = '';
  for (const row of rows) {
    if (row.movement !== movement) text.push('', `${row.day} (${row.movement}) ${row.kind}`);
    movement = row.movement;
    for (const [account, amount] of amounts(row)) text.push(`  ${account}  ${amount}`);
  }
  return `${text.join('\n')}\n`;
}

/** What is where by the table of balances: `place, commodity` -> amount, without what is nothing. */
export async function balancesOf(client: pg.Client): Promise<Map<string, string>> {
  const { rows } = await client.query<Sides>(
    `SELECT lot_id::text AS lot, place_kind || ' ' || place_id AS place, weight::text, pieces::text,
       cost::text FROM balance`,
  );
  const balances = new Map<string, string>();
  for (const row of rows) {
    for (const [account, amount] of amounts(row)) {
      const [, number = '', commodity = ''] = /^(\S+) "(.+)"$/.exec(amount) ?? [];
      if (!/^-?[0.]+$/.test(number)) balances.set(`${account}, ${commodity}`, number);
    }
  }
  return balances;
}

function amounts({ lot, place, weight, pieces, cost }: Sides): [string, string][] {
  return [
    [place, `${decimal(weight, 3)} "ct ${lot}"`],
    [place, `${pieces} "pieces ${lot}"`],
    [place, `${decimal(cost, 2)} "cost ${lot}"`],
  ];
}

/** Whole units as a decimal, by their digits. */
function decimal(whole: string, places: number): string {
  const sign = whole.startsWith('-') ? '-' : '';
  const digits = whole.replace('-', '').padStart(places + 1, '0');
  return `${sign}${digits.slice(0, -places)}.${digits.slice(-places)}`;
}
