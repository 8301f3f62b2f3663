import type { MemoDetail, MemoLine } from '@foldwell/contracts';
import { formatAmount, formatCarats, pricePerCarat, shortDate } from '@foldwell/quantities';
import { Link } from 'react-router-dom';

import { BalanceBar } from '../../../components/balance-bar';
import { flowParts } from '../../../components/memo-table';
import type { useCurrentRow } from '../../../components/row-keys';

/** Lines of the memo, each with its own bar; the stated weight stands beside it where it prices. */
export function MemoLines({
  memo,
  picked,
  onPick,
  rows,
}: {
  memo: MemoDetail;
  picked: Set<string>;
  onPick(lot: string): void;
  rows: ReturnType<typeof useCurrentRow>;
}) {
  const sum = (pick: (line: MemoLine) => number) =>
    memo.lines.reduce((all, line) => all + pick(line), 0);
  const isStated = memo.lines.some(
    (line) => line.lotKind === 'stone' && line.pricedWeight !== line.flows.sent,
  );
  return (
    <table className="tall">
      <caption>Lines of M {memo.number}</caption>
      <thead>
        <tr>
          <th scope="col">
            <span className="sr-only">Selected</span>
          </th>
          <th scope="col">Lot</th>
          <th scope="col">What</th>
          <th scope="col" className="n wide">
            Pcs
          </th>
          <th scope="col" className="n">
            Sent <span className="unit">ct</span>
          </th>
          <th scope="col" className="n wide">
            Back <span className="unit">ct</span>
          </th>
          <th scope="col" className="n wide">
            Kept <span className="unit">ct</span>
          </th>
          <th scope="col" className="n">
            Out <span className="unit">ct</span>
          </th>
          <th scope="col" style={{ width: 140 }}>
            Balance of the line
          </th>
          {isStated && (
            <th scope="col" className="n wide">
              Priced <span className="unit">ct stated</span>
            </th>
          )}
          <th scope="col" className="n wide">
            Price <span className="unit">{memo.currency}/ct</span>
          </th>
          <th scope="col" className="n wide">
            Value out <span className="unit">{memo.currency}</span>
          </th>
        </tr>
      </thead>
      <tbody ref={rows.body}>
        {memo.lines.map((line, index) => (
          <tr
            key={line.lineId}
            className={`hoverable ${line.differenceId ? 'differs' : index === rows.current ? 'current' : ''}`}
            aria-selected={picked.has(line.lot)}
            onClick={() => rows.setCurrent(index)}
          >
            <td>
              <input
                type="checkbox"
                aria-label={`Select ${line.lot}`}
                checked={picked.has(line.lot)}
                onChange={() => onPick(line.lot)}
              />
            </td>
            <td className="lot">
              <Link to={`/lots/${line.lot}`}>{line.lot}</Link>
            </td>
            <td>
              {line.what}
              {line.due && <span className="quiet"> due {shortDate(line.due)}</span>}
            </td>
            <td className="n wide">
              {line.isEstimated && <span className="quiet">about </span>}
              {line.sentPieces}
            </td>
            <td className="n quiet">{formatCarats(line.flows.sent)}</td>
            <td className="n wide">
              {line.flows.returned ? formatCarats(line.flows.returned) : '–'}
            </td>
            <td className="n wide">{line.flows.kept ? formatCarats(line.flows.kept) : '–'}</td>
            <td className="n">
              <b>{formatCarats(line.flows.out)}</b>
            </td>
            <td>
              <BalanceBar parts={flowParts(line.flows)} />
            </td>
            {isStated && <td className="n wide">{formatCarats(line.pricedWeight)}</td>}
            <td className="n wide">
              {formatAmount(
                line.price ?? pricePerCarat(line.sum ?? 0, line.pricedWeight) ?? 0,
                memo.currency,
                true,
              )}
              {line.sum !== null && <span className="unit"> sum</span>}
            </td>
            <td className="n wide">{formatAmount(line.valueOut, memo.currency)}</td>
          </tr>
        ))}
      </tbody>
      <tfoot>
        <tr>
          <td />
          <td>{memo.lots} lots</td>
          <td />
          <td className="n wide">{sum((line) => line.sentPieces)}</td>
          <td className="n">{formatCarats(memo.flows.sent)}</td>
          <td className="n wide">{formatCarats(memo.flows.returned)}</td>
          <td className="n wide">{formatCarats(memo.flows.kept)}</td>
          <td className="n">{formatCarats(memo.flows.out)}</td>
          <td />
          {isStated && <td className="n wide">{formatCarats(sum((line) => line.pricedWeight))}</td>}
          <td className="wide" />
          <td className="n wide">{formatAmount(memo.value, memo.currency)}</td>
        </tr>
      </tfoot>
    </table>
  );
}
