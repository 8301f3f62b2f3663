/**
 * Somebody was first: what stands there now, field by field, beside what was typed. `words` names the
 * fields as the screen does; one without a word is called as it is.
 */
export function ChangedMeanwhile<T extends object>({
  theirs,
  mine,
  words = {},
}: {
  theirs: T;
  mine: T;
  words?: Partial<Record<keyof T, string>>;
}) {
  const differing = (Object.keys(theirs) as (keyof T & string)[]).filter(
    (name) => theirs[name] !== mine[name],
  );
  return (
    <div className="note warn" role="alert">
      <h3 className="red">Changed meanwhile</h3>
      {differing.length === 0 ? (
        <p>Theirs now is the same as yours.</p>
      ) : (
        <ul>
          {differing.map((name) => (
            <li key={name}>
              {words[name] ?? name}: theirs now {String(theirs[name] || 'empty')}, yours{' '}
              {String(mine[name] || 'empty')}.
            </li>
          ))}
        </ul>
      )}
      <p>Yours stands in the fields; keep again to write it over theirs.</p>
    </div>
  );
}
