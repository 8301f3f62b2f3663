import type { MemoDetail, MemoLine } from '@foldwell/contracts';
import {
  dueWords,
  formatAmount,
  formatCarats,
  formatMoney,
  formatPoints,
  pricePerCarat,
  shortDate,
} from '@foldwell/quantities';
import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useNavigate, useParams, useSearchParams } from 'react-router-dom';

import { BalanceBar, Beam } from '../../../components/balance-bar';
import { Loaded } from '../../../components/loading';
import { flowParts } from '../../../components/memo-table';
import { useCurrentRow } from '../../../components/row-keys';
import { api } from '../../../lib/api-client';
import { useKeys } from '../../../lib/keys';
import { useMe } from '../../../lib/session';
import { MemoActs } from './memo-acts';

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
          <Lines memo={memo} picked={picked} onPick={pick} rows={rows} />
          <div className="grid md:grid-cols-2 border-t border-crease-2">
            <Words memo={memo} />
            <Papers memo={memo} />
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

function Lines({
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

function Words({ memo }: { memo: MemoDetail }) {
  const [words, setWords] = useState('');
  const [isTheirs, setTheirs] = useState(false);
  const client = useQueryClient();
  const keep = async () => {
    if (words.trim() === '') return;
    await api(`/memos/${memo.number}/words`, { method: 'POST', body: { words, isTheirs } });
    setWords('');
    await client.invalidateQueries({ queryKey: ['memo', memo.number] });
  };
  return (
    <div className="min-w-0">
      <div className="section-head">
        <h2>Words with {memo.party}</h2>
      </div>
      <table>
        <caption>Words</caption>
        <tbody>
          {memo.words.map((one) => (
            <tr key={one.at + one.words}>
              <td className="soft">{shortDate(one.at.slice(0, 10))}</td>
              <td className={`whitespace-normal ${one.isTheirs ? 'font-semibold' : ''}`}>
                {one.words}
              </td>
              <td className="quiet">{one.by}</td>
            </tr>
          ))}
        </tbody>
      </table>
      <div className="flex gap-2 px-6 py-3 items-center">
        <input
          aria-label="Write down a call"
          placeholder="Write down a call"
          className="border border-edge bg-paper px-2 h-[30px] grow min-w-0"
          value={words}
          onChange={(event) => setWords(event.target.value)}
          onKeyDown={(event) => {
            if (event.key === 'Enter') void keep();
          }}
        />
        <label className="check small">
          <input
            type="checkbox"
            checked={isTheirs}
            onChange={(event) => setTheirs(event.target.checked)}
          />
          theirs
        </label>
        <button type="button" className="btn" onClick={() => void keep()}>
          Keep note
        </button>
      </div>
    </div>
  );
}

function Papers({ memo }: { memo: MemoDetail }) {
  return (
    <div className="border-l border-crease-2 min-w-0">
      <div className="section-head">
        <h2>Papers</h2>
        <span className="quiet small">{memo.papers.length} on file</span>
      </div>
      <table>
        <caption>Papers of M {memo.number}</caption>
        <tbody>
          {memo.papers.map((paper) => (
            <tr key={paper.kind + paper.number}>
              <td>{paper.kind}</td>
              <td>
                {paper.kind === 'Memo' ? (
                  <Link to={`/print/memos/${memo.number}`}>{paper.number}</Link>
                ) : (
                  paper.number
                )}
              </td>
              <td>{shortDate(paper.date)}</td>
            </tr>
          ))}
        </tbody>
      </table>
      <div className="section-head">
        <h2>Terms of this memo</h2>
      </div>
      <table>
        <caption>Terms</caption>
        <tbody>
          <tr>
            <td className="soft">Title</td>
            <td className="n">ours until invoiced</td>
          </tr>
          <tr>
            <td className="soft">Risk</td>
            <td className="n">as the terms say</td>
          </tr>
          <tr>
            <td className="soft">Handed to</td>
            <td className="n">
              {memo.handedTo || '–'}, {memo.carriedBy || '–'}
            </td>
          </tr>
          <tr>
            <td className="soft">Tolerance</td>
            <td className="n">
              stone {formatCarats(memo.stoneTolerance)}, parcel {formatCarats(memo.parcelTolerance)}{' '}
              <span className="unit">ct</span>
            </td>
          </tr>
          {memo.otherMemos.map((other) => (
            <tr key={other.number}>
              <td className="soft">Their other memo</td>
              <td className="n">
                <Link to={`/memos/${other.number}`}>M {other.number}</Link>,{' '}
                {formatCarats(other.out)} <span className="unit">ct</span>
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
