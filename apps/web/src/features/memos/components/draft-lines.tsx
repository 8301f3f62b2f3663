import type { DraftLine } from '@foldwell/contracts';
import { formatAmount, formatCarats, pricePerCarat } from '@foldwell/quantities';

import { BalanceBar } from '../../../components/balance-bar';

/** The lines written so far, each with its lot's bar as it will be. */
export function DraftLines({
  lines,
  currency,
  onDrop,
  onEdit,
}: {
  lines: DraftLine[];
  currency: string;
  onDrop(lot: string): void;
  onEdit(line: DraftLine): void;
}) {
  return (
    <table className="tall">
      <caption>Lines of the draft</caption>
      <thead>
        <tr>
          <th scope="col">Line</th>
          <th scope="col">Lot</th>
          <th scope="col">What</th>
          <th scope="col" className="n">
            Pcs
          </th>
          <th scope="col" className="n">
            Weight <span className="unit">ct</span>
          </th>
          <th scope="col" className="n wide">
            Free there <span className="unit">ct</span>
          </th>
          <th scope="col" style={{ width: 150 }} className="wide">
            Lot after booking
          </th>
          <th scope="col" className="n">
            Price <span className="unit">{currency}/ct</span>
          </th>
          <th scope="col" className="n">
            Total <span className="unit">{currency}</span>
          </th>
          <th scope="col">
            <span className="sr-only">Change</span>
          </th>
        </tr>
      </thead>
      <tbody>
        {lines.map((line, index) => {
          const price = line.price ?? pricePerCarat(line.amount, line.pricedWeight);
          return (
            <tr key={line.lot} className="hoverable">
              <td className="quiet">{index + 1}</td>
              <td className="lot">{line.lot}</td>
              <td>
                {line.what}
                <span className="quiet small"> {line.placeWords}</span>
              </td>
              <td className="n">
                {line.isEstimated && <span className="quiet">about </span>}
                {line.pieces}
              </td>
              <td className="n">
                <b>{formatCarats(line.weight)}</b>
              </td>
              <td className="n quiet wide">{formatCarats(line.free)}</td>
              <td className="wide">
                <BalanceBar parts={line.after} />
              </td>
              <td className="n">
                {price === null || (line.price === null && line.sum === null) ? (
                  <span className="red">none yet</span>
                ) : (
                  formatAmount(price, currency, true)
                )}
              </td>
              <td className="n">{formatAmount(line.amount, currency)}</td>
              <td>
                <button type="button" className="link small" onClick={() => onEdit(line)}>
                  edit
                </button>{' '}
                <button
                  type="button"
                  className="link small"
                  onClick={() => onDrop(line.lot)}
                  aria-label={`Drop ${line.lot}`}
                >
                  drop
                </button>
              </td>
            </tr>
          );
        })}
      </tbody>
    </table>
  );
}
