import type { MemoDetail, MemoLine, WeighedBack } from '@foldwell/contracts';
import { dueWords, formatCarats, formatPoints, shortDate } from '@foldwell/quantities';
import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate, useParams, useSearchParams } from 'react-router-dom';

import { Beam } from '../../../components/balance-bar';
import { Loaded } from '../../../components/loading';
import { flowParts } from '../../../components/memo-table';
import { Agrees, Needle } from '../../../components/needle';
import { Refused } from '../../../components/refused';
import { api } from '../../../lib/api-client';
import { useKeys, useScanner } from '../../../lib/keys';
import { useMay, useMe } from '../../../lib/session';
import { AnswerPanel } from './answer-panel';
import { readingOf } from './reading-of';
import { WeighPanel } from './weigh-panel';

/** Weigh back line by line; in tolerance answers itself, the rest becomes a difference. */
export function ReturnDeskPage() {
  const { number = '' } = useParams();
  const query = useQuery({
    queryKey: ['memo', number],
    queryFn: () => api<MemoDetail>(`/memos/${number}`),
  });
  return (
    <Loaded query={query} says={`Laying out M ${number}.`}>
      {(memo) => <Desk memo={memo} key={number} />}
    </Loaded>
  );
}

function Desk({ memo }: { memo: MemoDetail }) {
  const {
    house: { today },
  } = useMe();
  const navigate = useNavigate();
  const client = useQueryClient();
  const [search] = useSearchParams();
  const may = useMay('owner', 'dealer', 'bookkeeper');
  const wanted = memo.differenceList.find((one) => one.id === search.get('difference'))?.lot;
  const [lot, setLot] = useState(
    wanted ?? memo.lines.find((line) => line.flows.out > 0)?.lot ?? memo.lines[0]?.lot ?? '',
  );
  const [said, setSaid] = useState<(WeighedBack & { lot: string }) | null>(null);
  const [error, setError] = useState<unknown>();
  const at = Math.max(
    0,
    memo.lines.findIndex((line) => line.lot === lot),
  );
  const line = memo.lines[at];
  const difference = memo.differenceList.find((one) => one.lot === lot && one.answer === null);
  const pick = (index: number) => {
    const next = memo.lines[Math.max(0, Math.min(memo.lines.length - 1, index))];
    if (next) {
      setLot(next.lot);
      setSaid(null);
    }
  };
  useScanner((text) => {
    const found = memo.lines.find(
      (one) =>
        one.lot === text.trim().toUpperCase() ||
        one.report.toUpperCase().endsWith(text.trim().toUpperCase()),
    );
    if (found) {
      setLot(found.lot);
      setSaid(null);
    } else setError(new Error(`${text} is not on M ${memo.number}.`));
  });
  const close = async () => {
    try {
      const { number } = await api<{ number: string }>(`/memos/${memo.number}/return-slip`, {
        method: 'POST',
        key: crypto.randomUUID(),
        body: {},
      });
      await client.invalidateQueries();
      void navigate(`/print/returns/${encodeURIComponent(number)}`);
    } catch (problem) {
      setError(problem);
    }
  };
  useKeys(
    [
      { key: '↓', says: 'line', act: () => pick(at + 1) },
      { key: '↑', says: '', act: () => pick(at - 1) },
      { key: 'Ctrl Enter', says: 'close the return', act: () => void close(), inFields: true },
      { key: 'Esc', says: 'back to the desk', act: () => void navigate('/returns') },
    ],
    'Readings are typed, or come from a scanner',
  );
  const done = (outcome: WeighedBack) => {
    // The lot it was said of: the desk has moved on to the next by then.
    setSaid({ ...outcome, lot });
    setError(undefined);
    void client.invalidateQueries();
    if (outcome.outcome === 'agrees' || outcome.outcome === 'restated') {
      const next =
        memo.lines.find((one, index) => index > at && isOpen(one)) ??
        memo.lines.find((one) => one.lot !== lot && isOpen(one));
      if (next) setLot(next.lot);
    }
  };
  const toWeigh = memo.lines.filter(isOpen).length;
  const toAnswer = memo.differenceList.filter((one) => one.answer === null).length;
  const when = dueWords(memo.due, today);
  return (
    <>
      <div className="head">
        <h1>Return desk</h1>
        <span className="soft">
          M {memo.number}, {memo.party}. Sent {shortDate(memo.date, today)}, due{' '}
          {shortDate(memo.due, today)},{' '}
          <span className={when.startsWith('late') ? 'red' : ''}>
            {memo.state === 'settled' ? 'settled' : when}
          </span>
        </span>
        <div className="acts">
          <button
            type="button"
            className="btn"
            onClick={() => void navigate(`/memos/${memo.number}`)}
          >
            Open the memo
          </button>
        </div>
      </div>
      <Beam
        parts={flowParts(memo.flows)}
        whole={memo.flows.sent - memo.flows.restated - memo.flows.writtenOff - memo.flows.converted}
        legend={[
          {
            part: 'out',
            name: 'On memo',
            weight: memo.flows.out,
            under: `${toWeigh} lots still to weigh`,
          },
          { part: 'returned', name: 'Returned', weight: memo.flows.returned },
          { part: 'sold', name: 'Kept', weight: memo.flows.kept },
          {
            part: 'missing',
            name: 'Missing',
            weight: memo.flows.missing,
            under: toAnswer > 0 ? `${toAnswer} to answer` : '',
            isRed: toAnswer > 0,
          },
          { name: 'Restated', weight: memo.flows.restated },
          {
            name: '= Sent',
            weight: memo.flows.sent,
            under: `${memo.lots} lots sent ${shortDate(memo.date, today)}`,
          },
        ]}
      />
      <section className="grid lg:grid-cols-[minmax(0,1fr)_440px] lg:flex-1 lg:min-h-0 border-t border-crease-2">
        <div className="min-w-0 overflow-x-auto lg:overflow-auto">
          <Lines
            memo={memo}
            current={lot}
            onPick={(one) => {
              setLot(one);
              setSaid(null);
            }}
          />
          <div className="p-6">
            <Refused error={error} />
            {said && (
              <div
                className={`note ${['agrees', 'restated'].includes(said.outcome) ? '' : 'warn'}`}
                role="status"
                aria-live="polite"
              >
                <b>{said.lot}</b> {said.says}.
                {said.weighing > 0 && <span className="quiet"> Reading W {said.weighing}.</span>}
              </div>
            )}
            {memo.differenceList.some(
              (one) => one.kind === 'suspected switch' && one.answer === null,
            ) && (
              <div className="note warn mt-2">
                <b>Suspected, not proven.</b> Seal it, call a second witness, speak to insurer and
                counsel before accusing.
              </div>
            )}
          </div>
        </div>
        <aside className="side">
          {line &&
            (difference ? (
              <AnswerPanel
                difference={difference}
                key={difference.id}
                onDone={() => void client.invalidateQueries()}
              />
            ) : may ? (
              <WeighPanel memo={memo} line={line} key={line.lot} onDone={done} />
            ) : (
              <p>Taking back, owner, dealer and bookkeeper only.</p>
            ))}
        </aside>
      </section>
      <section className="foot">
        <span>
          <WhatIsNext lines={memo.lines} current={line} />
        </span>
        <span className="grow" />
        {toAnswer > 0 && <span className="red">{toAnswer} to answer</span>}
        <button type="button" className="btn primary" onClick={() => void close()}>
          Close the return, print the slip <kbd>Ctrl Enter</kbd>
        </button>
      </section>
    </>
  );
}

const isOpen = (line: MemoLine) => line.flows.out > 0;

function WhatIsNext({ lines, current }: { lines: MemoLine[]; current: MemoLine | undefined }) {
  const next = current && isOpen(current) ? current : lines.find(isOpen);
  if (!next) return 'All lines are weighed.';
  return (
    <>
      Next: <b>{next.lot}</b> {next.what}. Lay it on the balance, or scan it.
    </>
  );
}

function Lines({
  memo,
  current,
  onPick,
}: {
  memo: MemoDetail;
  current: string;
  onPick(lot: string): void;
}) {
  return (
    <table className="tall">
      <caption>Lines to weigh back</caption>
      <thead>
        <tr>
          <th scope="col">Lot</th>
          <th scope="col">What</th>
          <th scope="col" className="n wide">
            Sent <span className="unit">ct</span>
          </th>
          <th scope="col" className="n wide">
            Kept <span className="unit">ct</span>
          </th>
          <th scope="col" className="n">
            Expected <span className="unit">ct</span>
          </th>
          <th scope="col" className="n">
            Found <span className="unit">ct</span>
          </th>
          <th scope="col" className="n">
            Over, short <span className="unit">points</span>
          </th>
          <th scope="col" className="wide">
            Needle
          </th>
          <th scope="col" className="n wide">
            Back <span className="unit">ct</span>
          </th>
          <th scope="col">Answer</th>
        </tr>
      </thead>
      <tbody>
        {memo.lines.map((line) => {
          const difference = memo.differenceList.find(
            (one) => one.lot === line.lot && one.answer === null,
          );
          const { expected, found, off } = readingOf(line, difference);
          const tolerance = line.lotKind === 'parcel' ? memo.parcelTolerance : memo.stoneTolerance;
          return (
            <tr
              key={line.lot}
              className={`hoverable ${difference ? 'differs' : line.lot === current ? 'current' : ''}`}
              onClick={() => onPick(line.lot)}
              aria-current={line.lot === current || undefined}
            >
              <td className="lot">
                <button
                  type="button"
                  className="link font-semibold"
                  onClick={() => onPick(line.lot)}
                >
                  {line.lot}
                </button>
              </td>
              <td>{line.what}</td>
              <td className="n quiet wide">{formatCarats(line.flows.sent)}</td>
              <td className="n quiet wide">
                {line.flows.kept ? formatCarats(line.flows.kept) : '–'}
              </td>
              <td className="n">{formatCarats(expected)}</td>
              <td className="n">
                <b>{found === null ? '–' : formatCarats(found)}</b>
              </td>
              <td className={`n ${difference ? 'red' : 'soft'}`}>
                {off === null ? '–' : formatPoints(off)}
              </td>
              <td className="wide">{off !== null && <Needle off={off} tolerance={tolerance} />}</td>
              <td className="n wide">
                {line.flows.returned ? formatCarats(line.flows.returned) : '–'}
              </td>
              <td>
                {difference ? (
                  <span className="red">{difference.kind}, to answer</span>
                ) : line.flows.out > 0 ? (
                  <span className="quiet">
                    {line.flows.returned > 0 ? 'the rest is still out' : 'not weighed yet'}
                  </span>
                ) : line.flows.restated !== 0 ? (
                  <Agrees>{`restated ${formatPoints(line.flows.restated * -1)}`}</Agrees>
                ) : line.flows.kept > 0 && line.flows.returned === 0 ? (
                  'kept'
                ) : (
                  <Agrees>agrees</Agrees>
                )}
              </td>
            </tr>
          );
        })}
      </tbody>
    </table>
  );
}
