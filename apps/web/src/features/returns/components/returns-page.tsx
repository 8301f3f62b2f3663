import type { PlaceRow, ReturnsList } from '@foldwell/contracts';
import { dueWords, formatCarats, shortDate } from '@foldwell/quantities';
import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useNavigate } from 'react-router-dom';

import { Swatch } from '../../../components/balance-bar';
import { Choice } from '../../../components/field';
import { Loaded } from '../../../components/loading';
import { Refused } from '../../../components/refused';
import { useCurrentRow } from '../../../components/row-keys';
import { api } from '../../../lib/api-client';
import { useBookingKey } from '../../../lib/kept';
import { useKeys } from '../../../lib/keys';
import { useMe } from '../../../lib/session';

/** Which memo comes back, and what lies on the desk to be put away. */
export function ReturnsPage() {
  const query = useQuery({ queryKey: ['returns'], queryFn: () => api<ReturnsList>('/returns') });
  return (
    <Loaded query={query} says="Looking at the desk.">
      {(returns) => <Returns returns={returns} />}
    </Loaded>
  );
}

function Returns({ returns }: { returns: ReturnsList }) {
  const {
    house: { today },
  } = useMe();
  const navigate = useNavigate();
  const rows = useCurrentRow(returns.memos.length);
  useKeys([
    ...rows.keys,
    {
      key: 'Enter',
      says: 'weigh back',
      act: () => {
        const memo = returns.memos[rows.current];
        if (memo) void navigate(`/returns/${memo.number}`);
      },
    },
  ]);
  return (
    <>
      <div className="head">
        <h1>Return desk</h1>
        <span className="soft">scan a memo, or choose it; back is not yet put away</span>
      </div>
      <section className="grid xl:grid-cols-[minmax(0,1fr)_560px] flex-1 min-h-0">
        <div className="min-w-0 overflow-auto">
          <div className="section-head">
            <h2>Still out, or not agreeing</h2>
          </div>
          <table>
            <caption>Memos to take back</caption>
            <thead>
              <tr>
                <th scope="col">Memo</th>
                <th scope="col">Customer</th>
                <th scope="col" className="n">
                  Out <span className="unit">ct</span>
                </th>
                <th scope="col">Due</th>
                <th scope="col">When</th>
                <th scope="col">To answer</th>
              </tr>
            </thead>
            <tbody ref={rows.body}>
              {returns.memos.map((memo, index) => {
                const when = dueWords(memo.due, today);
                return (
                  <tr
                    key={memo.number}
                    className={`hoverable ${index === rows.current ? 'current' : ''}`}
                    onClick={() => rows.setCurrent(index)}
                  >
                    <td className="lot">
                      <Link to={`/returns/${memo.number}`}>M {memo.number}</Link>
                    </td>
                    <td>{memo.party}</td>
                    <td className="n">{formatCarats(memo.out)}</td>
                    <td>{shortDate(memo.due, today)}</td>
                    <td>
                      <span className={when.startsWith('late') ? 'red' : 'quiet'}>{when}</span>
                    </td>
                    <td>
                      {memo.differences > 0 ? <span className="red">{memo.differences}</span> : '–'}
                    </td>
                  </tr>
                );
              })}
            </tbody>
          </table>
        </div>
        <PutAway desk={returns.desk} />
      </section>
    </>
  );
}

function PutAway({ desk }: { desk: ReturnsList['desk'] }) {
  const {
    house: { today },
  } = useMe();
  const client = useQueryClient();
  const { data: places = [] } = useQuery({
    queryKey: ['places'],
    queryFn: () => api<PlaceRow[]>('/places'),
  });
  const [picked, setPicked] = useState<Set<string>>(new Set());
  const [to, setTo] = useState('');
  const [error, setError] = useState<unknown>();
  const [key, nextKey] = useBookingKey();
  const drawers = places.filter(
    (place) => ['drawer', 'show'].includes(place.kind) && !place.isClosed,
  );
  const toggle = (lot: string) =>
    setPicked((was) => {
      const next = new Set(was);
      if (!next.delete(lot)) next.add(lot);
      return next;
    });
  const put = async () => {
    setError(undefined);
    try {
      const lines = desk
        .filter((one) => picked.has(one.lot + one.placeId))
        .map(({ lot, placeId, weight, pieces }) => ({ lot, from: placeId, weight, pieces }));
      await api('/put-away', { method: 'POST', key, body: { to: to || drawers[0]?.id, lines } });
      nextKey();
      setPicked(new Set());
      await client.invalidateQueries();
    } catch (problem) {
      nextKey(problem);
      setError(problem);
    }
  };
  return (
    <aside className="side plain">
      <h2>On the desk, to put away</h2>
      {desk.length === 0 ? (
        <p className="soft pt-2">The desk is empty.</p>
      ) : (
        <>
          <table className="inner">
            <caption>On the desk and in quarantine</caption>
            <thead>
              <tr>
                <th scope="col">
                  <input
                    type="checkbox"
                    aria-label="Select all"
                    checked={picked.size === desk.length}
                    onChange={() =>
                      setPicked(
                        picked.size === desk.length
                          ? new Set()
                          : new Set(desk.map((one) => one.lot + one.placeId)),
                      )
                    }
                  />
                </th>
                <th scope="col">Lot</th>
                <th scope="col">Where</th>
                <th scope="col">From</th>
                <th scope="col" className="n">
                  Pcs
                </th>
                <th scope="col" className="n">
                  ct
                </th>
                <th scope="col">Since</th>
              </tr>
            </thead>
            <tbody>
              {desk.map((one) => (
                <tr key={one.lot + one.placeId}>
                  <td>
                    <input
                      type="checkbox"
                      aria-label={`Select ${one.lot}`}
                      checked={picked.has(one.lot + one.placeId)}
                      onChange={() => toggle(one.lot + one.placeId)}
                    />
                  </td>
                  <td className="lot">
                    <Link to={`/lots/${one.lot}`}>{one.lot}</Link>
                  </td>
                  <td>
                    <span className="status">
                      <Swatch part={one.place === 'Quarantine' ? 'safe' : 'returned'} />
                      {one.place}
                    </span>
                  </td>
                  <td className="quiet">{one.memo && `M ${one.memo}`}</td>
                  <td className="n">{one.pieces}</td>
                  <td className="n">{formatCarats(one.weight)}</td>
                  <td className="soft">{shortDate(one.since, today)}</td>
                </tr>
              ))}
            </tbody>
          </table>
          <div className="flex gap-3 items-end pt-3">
            <Choice
              label="To drawer"
              value={to || (drawers[0]?.id ?? '')}
              onValue={setTo}
              options={drawers.map((place) => [place.id, place.words] as const)}
              className="w-[180px]"
            />
            <button
              type="button"
              className="btn primary"
              disabled={picked.size === 0}
              onClick={() => void put()}
            >
              Put away {picked.size} lots
            </button>
          </div>
          <div className="pt-2">
            <Refused error={error} />
          </div>
        </>
      )}
    </aside>
  );
}
