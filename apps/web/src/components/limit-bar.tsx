import type { Exposure } from '@foldwell/contracts';
import { formatMoney } from '@foldwell/quantities';

/** Money against a limit, never in the bar's colours: out now, over, the limit an ink rule. */
export function LimitBar({
  exposure,
  scale,
  adds = 0,
  isTall,
}: {
  exposure: Exposure;
  scale: number;
  adds?: number;
  isTall?: boolean;
}) {
  const { total, limit, currency } = exposure;
  const part = (value: number) => `${(100 * value) / scale}%`;
  const after = total + adds;
  const over = limit === null ? 0 : Math.max(0, after - limit);
  const now = Math.min(total, after - over);
  return (
    <div
      className="limit"
      style={isTall ? {} : { height: 12, marginTop: 0 }}
      role="img"
      aria-label={`exposure ${formatMoney(after, currency)}${limit === null ? ', no limit set' : ` of ${formatMoney(limit, currency)}`}${over > 0 ? `, over by ${formatMoney(over, currency)}` : ''}`}
    >
      <i className="now" style={{ width: part(now) }} />
      {adds > 0 && <i className="this" style={{ width: part(Math.max(0, after - over - now)) }} />}
      {over > 0 && <i className="over" style={{ width: part(over) }} />}
      {limit !== null && limit <= scale && (
        <b style={{ left: part(limit) }}>
          {isTall && <span>limit {formatMoney(limit, currency)}</span>}
        </b>
      )}
    </div>
  );
}
