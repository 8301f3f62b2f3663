import type { FirstLight } from '@foldwell/contracts';
import {
  formatAmount,
  formatCarats,
  formatMoney,
  formatPoints,
  longDate,
} from '@foldwell/quantities';
import { useQuery } from '@tanstack/react-query';
import { Link, useNavigate } from 'react-router-dom';

import { Beam, type Part } from '../../../components/balance-bar';
import { DueLine } from '../../../components/due-line';
import { Loaded } from '../../../components/loading';
import { MemoTable } from '../../../components/memo-table';
import { Needle } from '../../../components/needle';
import { useCurrentRow } from '../../../components/row-keys';
import { api } from '../../../lib/api-client';
import { useKeys } from '../../../lib/keys';
import { useMay } from '../../../lib/session';

const LEGEND: [Part, string][] = [
  ['safe', 'Safe'],
  ['out', 'On memo'],
  ['returned', 'Returned'],
  ['sold', 'Sold'],
  ['missing', 'Missing'],
];

/** The arrival page: what is out, what is late, what came back and does not agree. */
export function FirstLightPage() {
  const query = useQuery({
    queryKey: ['first light'],
    queryFn: () => api<FirstLight>('/first-light'),
    refetchInterval: 30_000,
  });
  return (
    <Loaded query={query} says="Counting what is where.">
      {(light) => <Light light={light} />}
    </Loaded>
  );
}

function Light({ light }: { light: FirstLight }) {
  const navigate = useNavigate();
  const mayWrite = useMay('owner', 'dealer');
  const rows = useCurrentRow(light.memos.length);
  useKeys([
    ...rows.keys,
    {
      key: 'Enter',
      says: 'open',
      act: () => {
        const memo = light.memos[rows.current];
        if (memo) void navigate(`/memos/${memo.number}`);
      },
    },
    { key: 'R', says: 'return desk', act: () => void navigate('/returns') },
    ...(mayWrite
      ? [{ key: 'N', says: 'write a memo', act: () => void navigate('/memos/new') }]
      : []),
  ]);
  return (
    <>
      <div className="head">
        <h1>First light</h1>
        <span className="soft">{longDate(light.today)}.</span>
        <div className="acts">
          <Link className="btn" to="/returns">
            Open return desk <kbd>R</kbd>
          </Link>
          {mayWrite ? (
            <Link className="btn primary" to="/memos/new">
              Write a memo <kbd>N</kbd>
            </Link>
          ) : (
            <span className="quiet small">Writing memos is for owner and dealer.</span>
          )}
        </div>
      </div>
      <Beam
        parts={light.bar}
        whole={light.whole}
        legend={[
          ...LEGEND.map(([part, name]) => ({
            part,
            name,
            weight: light.bar[part],
            under: light.under[part],
            isRed: part === 'missing' && light.bar.missing > 0,
          })),
          { name: '= Whole', weight: light.whole, under: light.under.whole },
        ]}
      />
      <section className="bg-pad border-y border-crease-2 px-6 pt-1 max-md:hidden">
        <DueLine
          memos={light.memos.map(({ number, due, value }) => ({ number, due, value }))}
          today={light.today}
        />
      </section>
      <section className="grid xl:grid-cols-[minmax(0,1fr)_530px] min-h-0 flex-1">
        <div className="min-w-0 overflow-x-auto">
          <div className="section-head">
            <h2>Out on memo</h2>
            <span className="quiet small">
              {light.memos.length} memos{total(light)}
            </span>
          </div>
          {light.memos.length === 0 ? (
            <p className="px-6 py-3 soft">Nothing is out on memo.</p>
          ) : (
            <MemoTable memos={light.memos} today={light.today} rows={rows} />
          )}
        </div>
        <aside className="border-l border-crease-2 min-w-0 overflow-x-auto">
          <Differences light={light} />
          <Late light={light} />
        </aside>
      </section>
    </>
  );
}

function total({ memos }: FirstLight): string {
  const currencies = new Set(memos.map((memo) => memo.currency));
  const [currency] = currencies;
  if (!currency || currencies.size > 1) return '';
  return `, worth ${formatMoney(
    memos.reduce((sum, memo) => sum + memo.value, 0),
    currency,
  )} at memo price`;
}

function Differences({ light }: { light: FirstLight }) {
  const held = light.differences.reduce((sum, difference) => sum + difference.held, 0);
  return (
    <>
      <div className="section-head">
        <h2>Came back, does not agree</h2>
        {light.differences.length > 0 && (
          <span className="red small">{light.differences.length} to answer</span>
        )}
      </div>
      {light.differences.length === 0 ? (
        <p className="px-6 py-2 soft">All that came back agrees.</p>
      ) : (
        <table>
          <caption>Differences to answer</caption>
          <thead>
            <tr>
              <th scope="col">Lot, memo</th>
              <th scope="col" className="n">
                Expected <span className="unit">ct</span>
              </th>
              <th scope="col" className="n">
                Found <span className="unit">ct</span>
              </th>
              <th scope="col" className="n">
                Off
              </th>
              <th scope="col">Needle</th>
            </tr>
          </thead>
          <tbody>
            {light.differences.map((one) => (
              <tr key={one.id}>
                <td>
                  <Link
                    to={one.memo ? `/returns/${one.memo}?difference=${one.id}` : `/lots/${one.lot}`}
                  >
                    <b>{one.lot}</b>
                  </Link>{' '}
                  {one.party} <span className="quiet">{one.memo && `M ${one.memo}`}</span>
                </td>
                <td className="n">{formatCarats(one.expected)}</td>
                <td className="n">{formatCarats(one.found)}</td>
                <td className="n red">
                  {one.kind === 'pieces short'
                    ? `${one.heldPieces} pcs`
                    : formatPoints(one.found - one.expected)}
                </td>
                <td>
                  <Needle off={one.found - one.expected} tolerance={one.tolerance} />
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
      {held > 0 && (
        <p className="px-6 py-1 small quiet">
          Missing {formatCarats(held)} ct. Who weighed it does not answer it.
        </p>
      )}
    </>
  );
}

function Late({ light }: { light: FirstLight }) {
  const nextDue = light.memos[0];
  return (
    <>
      <div className="section-head">
        <h2>Late, by customer</h2>
        {light.late.length > 0 && <span className="quiet small">{light.late.length} memos</span>}
      </div>
      {light.late.length === 0 ? (
        <p className="px-6 py-2 soft">
          Nothing is late.{nextDue && ` The next memo due is M ${nextDue.number}.`}
        </p>
      ) : (
        <table>
          <caption>Late memos by customer</caption>
          <thead>
            <tr>
              <th scope="col">Customer</th>
              <th scope="col">Memo</th>
              <th scope="col" className="n">
                Late
              </th>
              <th scope="col" className="n">
                Value out
              </th>
              <th scope="col">Last word</th>
            </tr>
          </thead>
          <tbody>
            {light.late.map((one) => (
              <tr key={one.memo}>
                <td>
                  <Link to={`/customers/${one.partyNumber}`}>{one.party}</Link>
                </td>
                <td>
                  <Link to={`/memos/${one.memo}`}>M {one.memo}</Link>
                </td>
                <td className="n red">{one.days} d</td>
                <td className="n">
                  {formatAmount(one.value, one.currency)}{' '}
                  <span className="unit">{one.currency}</span>
                </td>
                <td className="soft max-w-[200px] truncate">{one.lastWord}</td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
    </>
  );
}
