import type { MemoRow } from '@foldwell/contracts';
import { dueWords, formatAmount, formatCarats, shortDate } from '@foldwell/quantities';
import { Link, useNavigate } from 'react-router-dom';

import { BalanceBar, type Parts } from './balance-bar';
import type { useCurrentRow } from './row-keys';

/** A memo's flows as its bar: what is kept is sold's part, what was put away stays returned. */
export function flowParts(flows: MemoRow['flows']): Parts {
  return { out: flows.out, returned: flows.returned, sold: flows.kept, missing: flows.missing };
}

/** Memos by due date, each with its bar; the current row by keys. */
export function MemoTable({
  memos,
  today,
  rows,
}: {
  memos: MemoRow[];
  today: string;
  rows: ReturnType<typeof useCurrentRow>;
}) {
  const navigate = useNavigate();
  const sum = (pick: (memo: MemoRow) => number) => memos.reduce((all, memo) => all + pick(memo), 0);
  const isOneCurrency = new Set(memos.map((memo) => memo.currency)).size === 1;
  return (
    <table>
      <caption>Memos by due date</caption>
      <thead>
        <tr>
          <th scope="col">Memo</th>
          <th scope="col">Customer</th>
          <th scope="col" className="n wide">
            Lots
          </th>
          <th scope="col" style={{ width: 190 }}>
            Balance
          </th>
          <th scope="col" className="n">
            Out <span className="unit">ct</span>
          </th>
          <th scope="col" className="n wide">
            Sent <span className="unit">ct</span>
          </th>
          <th scope="col" className="n wide">
            Value out
          </th>
          <th scope="col" className="wide">
            Due
          </th>
          <th scope="col">When</th>
        </tr>
      </thead>
      <tbody ref={rows.body}>
        {memos.map((memo, index) => {
          const when =
            memo.state === 'settled' || memo.state === 'void'
              ? memo.state
              : dueWords(memo.due, today);
          return (
            <tr
              key={memo.number}
              className={`hoverable ${index === rows.current ? 'current' : ''}`}
              aria-current={index === rows.current || undefined}
              onClick={() => rows.setCurrent(index)}
              onDoubleClick={() => void navigate(`/memos/${memo.number}`)}
            >
              <td className="lot">
                <Link to={`/memos/${memo.number}`}>M {memo.number}</Link>
              </td>
              <td>{memo.party}</td>
              <td className="n wide">{memo.lots}</td>
              <td>
                <BalanceBar parts={flowParts(memo.flows)} />
              </td>
              <td className="n">{formatCarats(memo.flows.out)}</td>
              <td className="n quiet wide">{formatCarats(memo.flows.sent)}</td>
              <td className="n wide">
                {formatAmount(memo.value, memo.currency)}{' '}
                <span className="unit">{memo.currency}</span>
              </td>
              <td className="wide">{shortDate(memo.due, today)}</td>
              <td>
                {memo.differences > 0 ? (
                  <span className="red">to answer</span>
                ) : (
                  <span
                    className={
                      when.startsWith('late') ? 'red' : when === 'today' ? 'font-semibold' : 'quiet'
                    }
                  >
                    {when}
                  </span>
                )}
              </td>
            </tr>
          );
        })}
      </tbody>
      <tfoot>
        <tr>
          <td>{memos.length} memos</td>
          <td />
          <td className="n wide">{sum((memo) => memo.lots)}</td>
          <td />
          <td className="n">{formatCarats(sum((memo) => memo.flows.out))}</td>
          <td className="n wide">{formatCarats(sum((memo) => memo.flows.sent))}</td>
          <td className="n wide">
            {isOneCurrency && memos[0]
              ? formatAmount(
                  sum((memo) => memo.value),
                  memos[0].currency,
                )
              : ''}
          </td>
          <td className="wide" />
          <td />
        </tr>
      </tfoot>
    </table>
  );
}
