import type { Assertion } from './assertion.js';

/**
 * Every constraint, unique index, trigger, function, generated column and right of the ledger as it
 * stands, each with a hash of its definition. What extensions bring is not ours.
 */
export const GUARDS_NOW = `
  SELECT 'constraint ' || conrelid::regclass || '.' || conname || ' ' || left(md5(pg_get_constraintdef(oid)), 12) AS guard
    FROM pg_constraint WHERE connamespace = 'public'::regnamespace AND contype <> 't'
  UNION ALL SELECT 'index ' || indexname || ' ' || left(md5(indexdef), 12) FROM pg_indexes WHERE schemaname = 'public' AND indexdef LIKE 'CREATE UNIQUE%'
  UNION ALL SELECT 'trigger ' || tgrelid::regclass || '.' || tgname || ' ' || left(md5(pg_get_triggerdef(oid)), 12)
    FROM pg_trigger WHERE NOT tgisinternal AND tgrelid IN (SELECT oid FROM pg_class WHERE relnamespace = 'public'::regnamespace)
  UNION ALL SELECT 'function ' || proname || ' ' || left(md5(pg_get_functiondef(oid)), 12) FROM pg_proc p
    WHERE pronamespace = 'public'::regnamespace AND prokind = 'f'
      AND NOT EXISTS (SELECT 1 FROM pg_depend d WHERE d.objid = p.oid AND d.classid = 'pg_proc'::regclass AND d.deptype = 'e')
  UNION ALL SELECT 'generated ' || adrelid::regclass || '.' || attname || ' ' || left(md5(pg_get_expr(adbin, adrelid)), 12)
    FROM pg_attrdef JOIN pg_attribute ON attrelid = adrelid AND attnum = adnum
    JOIN pg_class c ON c.oid = adrelid WHERE attgenerated <> '' AND relnamespace = 'public'::regnamespace
  UNION ALL SELECT 'right ' || relname || ' ' || grantee || ' ' || string_agg(privilege_type, ', ' ORDER BY privilege_type)
    FROM (SELECT c.relname, pg_get_userbyid(a.grantee) AS grantee, a.privilege_type
      FROM pg_class c CROSS JOIN LATERAL aclexplode(c.relacl) a
      WHERE c.relnamespace = 'public'::regnamespace AND c.relkind = 'r' AND a.grantee <> c.relowner) r
    GROUP BY relname, grantee
`;

/** Guards that were dropped, rewritten, added, switched off or never validated, against the list. */
export const OF_GUARDS: Assertion = {
  says: 'every guard stands as it was written',
  usesGuards: true,
  offenders: `(SELECT guard FROM unnest($1::text[]) AS wanted(guard) EXCEPT SELECT guard FROM guards_now) UNION ALL
    (SELECT 'not ours: ' || guard FROM guards_now EXCEPT SELECT 'not ours: ' || guard FROM unnest($1::text[]) AS wanted(guard)) UNION ALL
    SELECT 'not validated: ' || conname FROM pg_constraint WHERE NOT convalidated AND connamespace = 'public'::regnamespace UNION ALL
    SELECT 'switched off: ' || tgname FROM pg_trigger t JOIN pg_class c ON c.oid = t.tgrelid WHERE c.relnamespace = 'public'::regnamespace AND tgenabled <> 'O'`,
};
