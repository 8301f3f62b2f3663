import type { PartyDetail } from '@foldwell/contracts';
import {
  averageCarats,
  formatAmount,
  formatCarats,
  formatMoney,
  shortDate,
} from '@foldwell/quantities';
import { useQuery } from '@tanstack/react-query';
import { Link, useNavigate, useParams } from 'react-router-dom';

import { LimitBar } from '../../../components/limit-bar';
import { Loaded } from '../../../components/loading';
import { MemoTable } from '../../../components/memo-table';
import { useCurrentRow } from '../../../components/row-keys';
import { api } from '../../../lib/api-client';
import { useKeys } from '../../../lib/keys';
import { useMay, useMe } from '../../../lib/session';
import { EditParty } from './edit-party';

/** One customer: limit, terms, exposure now, what they hold. */
export function PartyPage() {
  const { number = '' } = useParams();
  const query = useQuery({
    queryKey: ['party', number],
    queryFn: () => api<PartyDetail>(`/parties/${number}`),
  });
  return (
    <Loaded query={query} says={`Opening C ${number}.`}>
      {(party) => <Party party={party} />}
    </Loaded>
  );
}

function Party({ party }: { party: PartyDetail }) {
  const {
    house: { today },
  } = useMe();
  const navigate = useNavigate();
  const rows = useCurrentRow(party.memos.length);
  const mayWrite = useMay('owner', 'dealer');
  useKeys([
    ...rows.keys,
    {
      key: 'Enter',
      says: 'open memo',
      act: () => {
        const memo = party.memos[rows.current];
        if (memo) void navigate(`/memos/${memo.number}`);
      },
    },
    ...(mayWrite
      ? [
          {
            key: 'N',
            says: 'write a memo',
            act: () => void navigate(`/memos/new?party=${party.number}`),
          },
        ]
      : []),
  ]);
  const { exposure, keeps } = party;
  return (
    <>
      <div className="head">
        <h1>{party.name}</h1>
        <span className="soft">
          C {party.number}, {party.town || 'no town'}. {party.parts.join(', ')}.
        </span>
        <div className="acts">
          {mayWrite && (
            <Link className="btn primary" to={`/memos/new?party=${party.number}`}>
              Write a memo <kbd>N</kbd>
            </Link>
          )}
        </div>
      </div>
      <section className="px-6 pb-4 border-b border-crease-2">
        <LimitBar
          exposure={exposure}
          scale={Math.max(1, exposure.total, (exposure.limit ?? 0) * 1.2)}
          isTall
        />
        <dl className="flex flex-wrap gap-x-10 gap-y-1 pt-2">
          {(
            [
              ['On memo', formatMoney(exposure.onMemo, exposure.currency)],
              ['Kept, not invoiced', formatMoney(exposure.kept, exposure.currency)],
              ['Exposure now', formatMoney(exposure.total, exposure.currency)],
              [
                'Limit',
                exposure.limit === null
                  ? 'none set'
                  : formatMoney(exposure.limit, exposure.currency),
              ],
              [
                'Keeps, of what we send',
                keeps.sent > 0
                  ? `${Math.round((100 * keeps.kept) / keeps.sent)} % of ${formatCarats(keeps.sent)} ct, ${keeps.memos} memos`
                  : 'nothing sent yet',
              ],
              ['Days out, average', keeps.daysOut === null ? '–' : `${keeps.daysOut} d`],
              ['Differences', keeps.differences === 0 ? 'none' : String(keeps.differences)],
            ] as const
          ).map(([name, value]) => (
            <div key={name}>
              <dt className="tiny quiet">{name}</dt>
              <dd className="font-semibold">{value}</dd>
            </div>
          ))}
        </dl>
        {party.papers && (
          <p className="note stop mt-2">
            {party.papers}. Nothing leaves without an owner’s reason.
          </p>
        )}
      </section>
      <section className="grid xl:grid-cols-[minmax(0,1fr)_470px] flex-1 min-h-0">
        <div className="min-w-0 overflow-x-auto">
          <div className="section-head">
            <h2>Memos</h2>
          </div>
          {party.memos.length === 0 ? (
            <p className="px-6 py-2 soft">No memo yet.</p>
          ) : (
            <MemoTable memos={party.memos} today={today} rows={rows} />
          )}
          <Holds party={party} />
        </div>
        <EditParty party={party} />
      </section>
    </>
  );
}

function Holds({ party }: { party: PartyDetail }) {
  const {
    house: { today },
  } = useMe();
  return (
    <>
      <div className="section-head">
        <h2>What they hold</h2>
        <span className="quiet small">{party.holds.length} lines</span>
      </div>
      <table>
        <caption>What {party.name} hold</caption>
        <thead>
          <tr>
            <th scope="col">Lot</th>
            <th scope="col">What</th>
            <th scope="col">Memo</th>
            <th scope="col" className="n">
              Pcs
            </th>
            <th scope="col" className="n">
              Weight <span className="unit">ct</span>
            </th>
            <th scope="col" className="n">
              Value <span className="unit">{party.exposure.currency}</span>
            </th>
            <th scope="col">Due</th>
          </tr>
        </thead>
        <tbody>
          {party.holds.map((line) => (
            <tr key={line.memo + line.lot}>
              <td className="lot">
                <Link to={`/lots/${line.lot}`}>{line.lot}</Link>
              </td>
              <td>
                {line.what}{' '}
                {line.pieces > 1 && (
                  <span className="quiet">
                    average {averageCarats(line.weight, line.pieces)} ct
                  </span>
                )}
              </td>
              <td>
                <Link to={`/memos/${line.memo}`}>M {line.memo}</Link>
              </td>
              <td className="n">{line.pieces}</td>
              <td className="n">{formatCarats(line.weight)}</td>
              <td className="n">{formatAmount(line.value, party.exposure.currency)}</td>
              <td className={line.due < today ? 'red' : ''}>{shortDate(line.due, today)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </>
  );
}
