import { formatCarats } from '@foldwell/quantities';
import type { ReactNode } from 'react';

export type Part = 'safe' | 'out' | 'returned' | 'sold' | 'missing';
export const PART_NAMES: Record<Part, string> = {
  safe: 'safe',
  out: 'on memo',
  returned: 'returned',
  sold: 'sold',
  missing: 'missing',
};
const ORDER: Part[] = ['safe', 'out', 'returned', 'sold', 'missing'];

/** Thousandths of a carat by part; parts in this order always. */
export type Parts = Partial<Record<Part, number>>;

/** The sentence of a bar for who can't see it: `safe 27.16, on memo 12.40; whole 48.62 ct`. */
function barWords(parts: Parts, whole: number): string {
  const named = ORDER.filter((part) => (parts[part] ?? 0) > 0).map(
    (part) => `${PART_NAMES[part]} ${formatCarats(parts[part] ?? 0)}`,
  );
  return `${named.join(', ') || 'nothing'}; whole ${formatCarats(whole)} ct`;
}

/** The strip that says where every carat is; `whole` is checked against its parts and a gap is shown. */
export function BalanceBar({
  parts,
  whole,
  size,
}: {
  parts: Parts;
  whole?: number;
  size?: 'foot' | 'beam';
}) {
  const sum = ORDER.reduce((all, part) => all + (parts[part] ?? 0), 0);
  const total = whole ?? sum;
  const nowhere = total - sum;
  return (
    <div
      className={`bar ${size ? `${size}-size` : ''}`}
      role="img"
      aria-label={
        barWords(parts, total) + (nowhere > 0 ? `, ${formatCarats(nowhere)} nowhere` : '')
      }
    >
      {ORDER.map((part) =>
        (parts[part] ?? 0) > 0 ? (
          <i key={part} className={part} style={{ flexGrow: parts[part] }} />
        ) : null,
      )}
      {nowhere > 0 && <i className="nowhere" style={{ flexGrow: nowhere }} />}
    </div>
  );
}

/** One column under the beam: a part, its carats, and what is said of it. */
export interface LegendPart {
  part?: Part;
  name: string;
  weight: number;
  under?: ReactNode;
  isRed?: boolean;
}

/** The large bar with hooks, marks and legend; the legend's last column is the whole. */
export function Beam({
  parts,
  whole,
  legend,
}: {
  parts: Parts;
  whole: number;
  legend: LegendPart[];
}) {
  return (
    <section className="px-[29px] pb-3">
      <div className="beam">
        <BalanceBar parts={parts} size="beam" />
        <div className="marks" />
      </div>
      <div className="legend">
        {legend.map(({ part, name, weight, under, isRed }) => (
          <div key={name} className={weight === 0 ? 'zero' : ''}>
            <div className="name">
              {part && <Swatch part={part} />}
              {name}
            </div>
            <div className="value">
              {formatCarats(weight)} <span className="unit">ct</span>
            </div>
            <div className={`tiny ${isRed ? 'red' : 'quiet'}`}>{under}</div>
          </div>
        ))}
      </div>
      {ORDER.reduce((all, part) => all + (parts[part] ?? 0), 0) !== whole && (
        <Nowhere parts={parts} whole={whole} />
      )}
    </section>
  );
}

function Nowhere({ parts, whole }: { parts: Parts; whole: number }) {
  const off = whole - ORDER.reduce((all, part) => all + (parts[part] ?? 0), 0);
  return (
    <p className="note stop" role="alert">
      <b>
        {formatCarats(Math.abs(off))} ct is {off > 0 ? 'nowhere' : 'too much'}.
      </b>{' '}
      Booking is stopped until the owner has verified the ledger.
    </p>
  );
}

/** A piece of the bar beside its word. */
export function Swatch({ part }: { part: Part }) {
  return <span className={`swatch ${part}`} aria-hidden="true" />;
}
