import type { MemoFlows, MemoRow } from '@foldwell/contracts';
import type { DataSource } from 'typeorm';

interface MemoRecord {
  number: string;
  party: string;
  party_number: string;
  date: string;
  due: string;
  lots: number;
  value: string;
  currency: string;
  is_settled: boolean;
  is_void: boolean;
  differences: number;
  out: string;
  returned: string;
  kept: string;
  missing: string;
  written_off: string;
  converted: string;
  restated: string;
  sent: string;
}

/** Sums of a memo's lines as flows; written once for the list and for one memo. */
export const FLOWS = `sum(n.out_weight) AS out, sum(n.returned_weight) AS returned, sum(n.kept_weight) AS kept, sum(n.missing_weight) AS missing,
  sum(n.written_off_weight) AS written_off, sum(n.converted_weight) AS converted, sum(n.restated_weight) AS restated, sum(n.sent_weight) AS sent`;

/** Memos that fit a condition on `m`, each with its flows and what is out at memo price. */
export async function memoRows(
  db: DataSource,
  condition: string,
  values: unknown[],
  tail = 'ORDER BY m.due, m.number',
): Promise<MemoRow[]> {
  const records = await db.query<MemoRecord[]>(
    `SELECT m.number, y.name AS party, y.number AS party_number, m.business_date::text AS date, m.due::text AS due, m.currency, m.is_settled,
       m.void_movement_id IS NOT NULL AS is_void, s.*
     FROM memo m JOIN party y ON y.id = m.party_id
     JOIN LATERAL (SELECT count(*)::int AS lots, ${FLOWS},
         coalesce(sum(memo_line_amount(n.price, n.agreed_sum, n.priced_weight, n.sent_weight, n.out_weight)), 0) AS value,
         (SELECT count(*)::int FROM difference d WHERE d.answer IS NULL AND d.memo_line_id = ANY (array_agg(n.id))) AS differences
       FROM memo_line n WHERE n.memo_id = m.id) s ON true
     WHERE ${condition} ${tail}`,
    values,
  );
  return records.map(memoRow);
}

function memoRow(record: MemoRecord): MemoRow {
  const flows = flowsOf(record);
  return {
    number: record.number,
    party: record.party,
    partyNumber: record.party_number,
    date: record.date,
    due: record.due,
    lots: record.lots,
    flows,
    value: Number(record.value),
    currency: record.currency,
    differences: record.differences,
    state: record.is_void
      ? 'void'
      : record.is_settled
        ? 'settled'
        : flows.out + flows.missing === flows.sent
          ? 'open'
          : 'part settled',
  };
}

/** Flows of a record as numbers, thousandths of a carat. */
export function flowsOf(
  record: Pick<
    MemoRecord,
    'out' | 'returned' | 'kept' | 'missing' | 'written_off' | 'converted' | 'restated' | 'sent'
  >,
): MemoFlows {
  return {
    out: Number(record.out),
    returned: Number(record.returned),
    kept: Number(record.kept),
    missing: Number(record.missing),
    writtenOff: Number(record.written_off),
    converted: Number(record.converted),
    restated: Number(record.restated),
    sent: Number(record.sent),
  };
}
