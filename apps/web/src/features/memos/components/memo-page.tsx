import type { MemoDetail } from '@foldwell/contracts';
import { dueWords, formatCarats, formatMoney, formatPoints, shortDate } from '@foldwell/quantities';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useNavigate, useParams, useSearchParams } from 'react-router-dom';

import { Beam } from '../../../components/balance-bar';
import { Loaded } from '../../../components/loading';
import { flowParts } from '../../../components/memo-table';
import { useCurrentRow } from '../../../components/row-keys';
import { api } from '../../../lib/api-client';
import { useKeys } from '../../../lib/keys';
import { useMe } from '../../../lib/session';
import { MemoActs } from './memo-acts';
import { MemoLines } from './memo-lines';
import { MemoPapers } from './memo-papers';
import { MemoWords } from './memo-words';

/** One memo: its bar, lines each with its own, words, papers; one act open at a time. */
export function MemoPage() {
  const { number = '' } = useParams();
  const query = useQuery({
    queryKey: ['memo', number],
    queryFn: () => api<MemoDetail>(`/memos/${number}`),
  });
  return (
    <Loaded query={query} says={`Unfolding M ${number}.`}>
      {(memo) => <Memo memo={memo} key={number} />}
    </Loaded>
  );
}

function Memo({ memo }: { memo: MemoDetail }) {
  const {
    house: { today },
  } = useMe();
  const [search] = useSearchParams();
  const navigate = useNavigate();
  const [picked, setPicked] = useState<Set<string>>(new Set());
  const rows = useCurrentRow(memo.lines.length);
  const { flows } = memo;
  const when =
    memo.state === 'void'
      ? 'void'
      : memo.state === 'settled'
        ? 'settled'
        : dueWords(memo.due, today);
  const pick = (lot: string | undefined) =>
    lot &&
    setPicked((was) => {
      const next = new Set(was);
      if (!next.delete(lot)) next.add(lot);
      return next;
    });
  useKeys([
    ...rows.keys,
    { key: 'X', says: 'select line', act: () => pick(memo.lines[rows.current]?.lot) },
    { key: 'R', says: 'take back', act: () => void navigate(`/returns/${memo.number}`) },
    { key: 'P', says: 'print', act: () => void navigate(`/print/memos/${memo.number}`) },
    {
      key: '[',
      says: 'previous',
      act: () => memo.previous && void navigate(`/memos/${memo.previous}`),
    },
    { key: ']', says: 'next', act: () => memo.next && void navigate(`/memos/${memo.next}`) },
  ]);
  const open = memo.differenceList.filter((difference) => difference.answer === null);
  return (
    <>
      <div className="head">
        <h1>M {memo.number}</h1>
        <span className="soft">
          <Link to={`/customers/${memo.partyNumber}`}>{memo.party}</Link>, C {memo.partyNumber}.
          Sent {shortDate(memo.date, today)} by {memo.by}, due {shortDate(memo.due, today)},{' '}
          <span className={when.startsWith('late') ? 'red' : ''}>{when}</span>
        </span>
        <div className="acts">
          <Link className="btn" to={`/print/memos/${memo.number}`}>
            Print <kbd>P</kbd>
          </Link>
          <Link className="btn" to={`/returns/${memo.number}`}>
            Take back <kbd>R</kbd>
          </Link>
        </div>
      </div>
      {search.get('booked') && (
        <p className="note mx-6 mb-2" role="status">
          <b>M {memo.number} booked out.</b> {memo.lots} lots, {formatCarats(flows.sent)} ct, due{' '}
          {shortDate(memo.due, today)}.
        </p>
      )}
      <Beam
        parts={flowParts(flows)}
        whole={flows.sent - flows.restated - flows.writtenOff - flows.converted}
        legend={[
          {
            part: 'out',
            name: 'On memo',
            weight: flows.out,
            under: `${memo.lines.filter((line) => line.flows.out > 0).length} lots, ${formatMoney(memo.value, memo.currency)}`,
          },
          {
            part: 'returned',
            name: 'Returned',
            weight: flows.returned,
            under: `${memo.lines.filter((line) => line.flows.returned > 0).length} lots`,
          },
          {
            part: 'sold',
            name: 'Kept',
            weight: flows.kept,
            under: flows.kept > 0 ? 'to invoice' : '',
          },
          {
            part: 'missing',
            name: 'Missing',
            weight: flows.missing,
            under: flows.missing > 0 ? 'to answer' : '',
            isRed: flows.missing > 0,
          },
          ...(flows.restated
            ? [{ name: 'Restated', weight: flows.restated, under: formatPoints(flows.restated) }]
            : []),
          ...(flows.writtenOff ? [{ name: 'Written off', weight: flows.writtenOff }] : []),
          ...(flows.converted ? [{ name: 'Worked', weight: flows.converted }] : []),
          { name: '= Sent', weight: flows.sent, under: `${memo.lots} lots` },
        ]}
      />
      <section className="grid lg:grid-cols-[minmax(0,1fr)_400px] lg:flex-1 lg:min-h-0 border-t border-crease-2">
        <div className="min-w-0 overflow-x-auto lg:overflow-auto">
          <MemoLines memo={memo} picked={picked} onPick={pick} rows={rows} />
          <div className="grid md:grid-cols-2 border-t border-crease-2">
            <MemoWords memo={memo} />
            <MemoPapers memo={memo} />
          </div>
        </div>
        <aside className="side grid gap-3 content-start">
          <MemoActs memo={memo} picked={[...picked]} />
          {open.length > 0 && (
            <div className="note warn">
              <h3 className="red">
                {open.length} {open.length === 1 ? 'difference' : 'differences'} to answer first
              </h3>
              {open.map((one) => (
                <p key={one.id}>
                  {one.lot} {one.kind}, {formatPoints(one.found - one.expected)}. {one.openedBy}{' '}
                  weighed it; {one.answerers.join(' or ') || 'nobody else yet'} answers.{' '}
                  <Link to={`/returns/${memo.number}?difference=${one.id}`}>Open</Link>
                </p>
              ))}
            </div>
          )}
          <p className="tiny quiet">
            {memo.insuredTo === null
              ? 'No insured sum is entered.'
              : `Insured to ${formatMoney(memo.insuredTo, memo.currency)}`}
            : as entered; ask your insurer whether memo, hand carriage and this address are covered.
          </p>
        </aside>
      </section>
    </>
  );
}
