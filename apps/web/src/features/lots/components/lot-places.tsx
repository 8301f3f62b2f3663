import type { LotDetail } from '@foldwell/contracts';
import { dueWords, formatAmount, formatCarats, shortDate } from '@foldwell/quantities';
import { Link } from 'react-router-dom';

import { Swatch } from '../../../components/balance-bar';
import { useMe } from '../../../lib/session';

/** One line for each place that holds some of the lot; it adds to the whole. */
export function LotPlaces({ lot }: { lot: LotDetail }) {
  const {
    house: { priceCurrency: base, today },
  } = useMe();
  const seesCost = lot.places.some((place) => place.cost !== undefined);
  const open = lot.places.find((place) => place.differenceId);
  return (
    <div className="min-w-0 overflow-x-auto">
      <div className="section-head">
        <h2>Places</h2>
        <span className="quiet small">one line for each place, adds to the whole</span>
        {open && <span className="red small ml-auto">a difference waits for an answer</span>}
      </div>
      <table>
        <caption>Places of {lot.row.number}</caption>
        <thead>
          <tr>
            <th scope="col">Place or holder</th>
            <th scope="col">Paper</th>
            <th scope="col">Since</th>
            <th scope="col">Due</th>
            <th scope="col" className="n">
              Pcs
            </th>
            <th scope="col" className="n">
              Weight <span className="unit">ct</span>
            </th>
            <th scope="col" className="n">
              Price <span className="unit">per ct</span>
            </th>
            <th scope="col" className="n">
              Value
            </th>
            {seesCost && (
              <th scope="col" className="n">
                Cost <span className="unit">{base}</span>
              </th>
            )}
          </tr>
        </thead>
        <tbody>
          {lot.places.map((place) => {
            const currency = place.currency ?? base;
            return (
              <tr
                key={place.placeId}
                className={place.part === 'missing' || place.differenceId ? 'differs' : ''}
              >
                <td>
                  <span className="status">
                    <Swatch part={place.part} />
                    {place.part === 'missing' ? (
                      <span className="red">Difference open</span>
                    ) : (
                      place.name
                    )}
                  </span>
                </td>
                <td>
                  {place.paper ? (
                    <Link to={`/memos/${place.paper.slice(2)}`}>{place.paper}</Link>
                  ) : (
                    '–'
                  )}
                </td>
                <td>{shortDate(place.since, today)}</td>
                <td className={place.due && place.due < today ? 'red' : ''}>
                  {place.due
                    ? `${shortDate(place.due, today)}, ${dueWords(place.due, today)}`
                    : '–'}
                </td>
                <td className="n">{place.pieces}</td>
                <td className="n">{formatCarats(place.weight)}</td>
                <td className="n">
                  {place.price === null ? '–' : formatAmount(place.price, currency, true)}
                </td>
                <td className="n">
                  {place.value === null ? (
                    '–'
                  ) : (
                    <>
                      {formatAmount(place.value, currency)} <span className="unit">{currency}</span>
                    </>
                  )}
                </td>
                {seesCost && <td className="n">{formatAmount(place.cost ?? 0, base)}</td>}
              </tr>
            );
          })}
        </tbody>
        <tfoot>
          <tr>
            <td>Whole</td>
            <td colSpan={3} />
            <td className="n">{lot.row.pieces}</td>
            <td className="n">{formatCarats(lot.row.weight)}</td>
            <td />
            <td />
            {seesCost && (
              <td className="n">
                {formatAmount(
                  lot.places.reduce((sum, place) => sum + (place.cost ?? 0), 0),
                  base,
                )}
              </td>
            )}
          </tr>
        </tfoot>
      </table>
    </div>
  );
}
