import type { DataSource } from 'typeorm';

/** A consigned lot, whose it is, and when it is due back to them. */
export interface ConsignorDue {
  lot: string;
  owner: string;
  due: string;
}

/** Which of these lots are due back to a consignor, by what they came in on. */
export function consignorDues(db: DataSource, lots: string[]): Promise<ConsignorDue[]> {
  return db.query<ConsignorDue[]>(
    `SELECT l.number AS lot, y.name AS owner, min(p.due)::text AS due
     FROM lot l JOIN party y ON y.id = l.owner_party_id JOIN balance b ON b.lot_id = l.id
     JOIN place p ON p.id = b.place_id AND p.kind = 'memo in' AND p.due IS NOT NULL
     WHERE l.number = ANY ($1) GROUP BY l.id, y.name ORDER BY l.id`,
    [lots],
  );
}
