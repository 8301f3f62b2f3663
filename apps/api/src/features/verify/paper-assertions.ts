import type { Assertion } from './assertion.js';

/** What numbers, papers, seals and the database itself must show. */
export const OF_PAPERS: Assertion[] = [
  {
    says: 'numbers of lots, memos, weighings and customers have no gaps',
    offenders: `SELECT series || ' series' FROM (
        SELECT s.series, s.first, s.next, x.n, x.least, x.most FROM number_series s JOIN LATERAL (
          SELECT count(*) AS n, min(k) AS least, max(k) AS most FROM (
            SELECT number AS k FROM memo WHERE s.series = 'memo' UNION ALL SELECT number FROM weighing WHERE s.series = 'weighing'
            UNION ALL SELECT number FROM party WHERE s.series = 'customer'
            UNION ALL SELECT number::bigint FROM lot WHERE s.series = 'lot' AND number ~ '^[0-9]+$') q) x ON true) y
      WHERE n <> next - first OR (n > 0 AND (least <> first OR most <> next - 1))`,
  },
  {
    says: 'papers of a memo are numbered without gaps',
    offenders: `SELECT 'M ' || m.number FROM memo m JOIN document d ON d.memo_id = m.id AND d.kind <> 'memo'
      GROUP BY m.number HAVING count(*) <> max(substring(d.number FROM '-([0-9]+)$')::int)
        OR min(substring(d.number FROM '-([0-9]+)$')::int) <> 1`,
  },
  {
    says: 'each issued paper is as it was issued',
    offenders: `SELECT number FROM document WHERE hash <> sha256(convert_to(snapshot, 'UTF8')) OR snapshot::jsonb ->> 'number' IS DISTINCT FROM number`,
  },
  {
    says: 'each memo has its paper',
    offenders: `SELECT 'M ' || m.number FROM memo m WHERE NOT EXISTS (SELECT 1 FROM document d WHERE d.memo_id = m.id AND d.kind = 'memo')`,
  },
  {
    says: 'the chain of seals is unbroken',
    offenders: `SELECT 'seal ' || s.id FROM seal s WHERE s.hash IS DISTINCT FROM seal_hash(s.id)
        OR (s.previous_id IS NULL AND s.id <> (SELECT min(id) FROM seal)) OR s.previous_id >= s.id
      UNION ALL SELECT 'seal ' || max(id) FROM seal HAVING count(*) > 0 AND count(*) <> count(previous_id) + 1`,
  },
  {
    says: 'all is sealed within the hour',
    offenders: `SELECT 'movement ' || m.id FROM movement m WHERE m.at < clock_timestamp() - interval '1 hour' AND NOT EXISTS (SELECT 1 FROM seal_member t WHERE t.movement_id = m.id)
      UNION ALL SELECT d.number FROM document d WHERE d.at < clock_timestamp() - interval '1 hour' AND NOT EXISTS (SELECT 1 FROM seal_member t WHERE t.document_id = d.id)`,
  },
  {
    says: 'a movement or a paper waits to be sealed or is sealed',
    offenders: `SELECT 'movement ' || m.id FROM movement m WHERE NOT EXISTS (SELECT 1 FROM seal_member t WHERE t.movement_id = m.id)
        AND NOT EXISTS (SELECT 1 FROM to_seal q WHERE q.movement_id = m.id)
      UNION ALL SELECT d.number FROM document d WHERE NOT EXISTS (SELECT 1 FROM seal_member t WHERE t.document_id = d.id)
        AND NOT EXISTS (SELECT 1 FROM to_seal q WHERE q.document_id = d.id)`,
  },
  {
    says: 'all is sealed within a minute',
    isWarning: true,
    offenders: `SELECT 'movement ' || m.id FROM movement m JOIN to_seal q ON q.movement_id = m.id WHERE m.at < clock_timestamp() - interval '1 minute'`,
  },
  {
    says: 'the database keeps what it acknowledges',
    offenders: `SELECT name || ' is ' || setting FROM pg_settings WHERE name IN ('synchronous_commit', 'fsync', 'full_page_writes', 'data_checksums') AND setting <> 'on'`,
  },
];
