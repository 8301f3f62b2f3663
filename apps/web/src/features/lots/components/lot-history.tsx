import type { LotDetail } from '@foldwell/contracts';
import { formatCarats, longDate, shortDate } from '@foldwell/quantities';

import { BalanceBar, type Part, Swatch } from '../../../components/balance-bar';
import { useMe } from '../../../lib/session';

const PART_WORDS: Record<Part, string> = {
  safe: 'Safe',
  out: 'On memo',
  returned: 'Returned',
  sold: 'Sold',
  missing: 'Missing',
};

/** Every entry with the bar after it; entries are never changed. */
export function LotHistory({ lot, onUndo }: { lot: LotDetail; onUndo: (() => void) | null }) {
  const {
    house: { today },
  } = useMe();
  return (
    <section className="border-t border-crease-2 overflow-x-auto">
      <div className="section-head">
        <h2>History</h2>
        <span className="quiet small">
          the balance after each entry; entries are never changed, only answered by a later one
        </span>
        {onUndo && (
          <button type="button" className="link small ml-auto" onClick={onUndo}>
            Undo the last booking
          </button>
        )}
      </div>
      <table>
        <caption>History of {lot.row.number}</caption>
        <thead>
          <tr>
            <th scope="col">When</th>
            <th scope="col">Who</th>
            <th scope="col">What</th>
            <th scope="col" className="n">
              Moved <span className="unit">ct</span>
            </th>
            <th scope="col">To</th>
            <th scope="col" style={{ width: 320 }}>
              Balance after
            </th>
            <th scope="col" className="n">
              Whole <span className="unit">ct</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {lot.history.map((entry) => {
            const whole =
              entry.after.safe +
              entry.after.out +
              entry.after.returned +
              entry.after.sold +
              entry.after.missing;
            return (
              <tr key={`${entry.at} ${entry.what}`}>
                <td title={longDate(entry.date)}>{shortDate(entry.date, today)}</td>
                <td className="soft">{entry.who}</td>
                <td>{entry.what}</td>
                <td className="n">{formatCarats(entry.moved)}</td>
                <td>
                  {entry.to && (
                    <span className="status">
                      <Swatch part={entry.to} />
                      {PART_WORDS[entry.to]}
                    </span>
                  )}
                </td>
                <td>
                  <BalanceBar parts={entry.after} />
                </td>
                <td className="n">{formatCarats(whole)}</td>
              </tr>
            );
          })}
        </tbody>
      </table>
    </section>
  );
}
