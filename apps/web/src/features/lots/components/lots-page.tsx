import type { LotPage, LotRow, LotSum } from '@foldwell/contracts';
import { formatAmount, formatCarats } from '@foldwell/quantities';
import { useInfiniteQuery, useQuery } from '@tanstack/react-query';
import { useRef, useState } from 'react';
import { Link, useNavigate, useSearchParams } from 'react-router-dom';

import { BalanceBar } from '../../../components/balance-bar';
import { NarrowNotice } from '../../../components/narrow-notice';
import { Refused } from '../../../components/refused';
import { useCurrentRow } from '../../../components/row-keys';
import { api } from '../../../lib/api-client';
import { useKeys } from '../../../lib/keys';
import { useMay, useMe } from '../../../lib/session';
import { LotTable } from './lot-table';
import { SavedSieves } from './saved-sieves';
import { SieveBar } from './sieve-bar';

/** What have we, at what price, where: the sieve above, the table, the sums of all that pass. */
export function LotsPage() {
  const [search, setSearch] = useSearchParams();
  const sieve = search.toString();
  const [picked, setPicked] = useState<Map<string, LotRow>>(new Map());
  const [unfolded, setUnfolded] = useState<string | null>(null);
  const sieveField = useRef<HTMLInputElement>(null);
  const navigate = useNavigate();
  const mayWrite = useMay('owner', 'dealer');
  const mayTakeIn = useMay('owner', 'buyer');
  const sums = useQuery({
    queryKey: ['lots', 'sum', sieve],
    queryFn: ({ signal }) => api<LotSum>(`/lots/sum?${sieve}`, { signal }),
    placeholderData: (before) => before,
  });
  const pages = useInfiniteQuery({
    queryKey: ['lots', sieve],
    initialPageParam: '',
    placeholderData: (before) => before,
    queryFn: ({ pageParam, signal }) =>
      api<LotPage>(`/lots?${sieve}${pageParam ? `&after=${pageParam}` : ''}`, { signal }),
    getNextPageParam: (page: LotPage) => page.next ?? undefined,
  });
  const rows = pages.data?.pages.flatMap((page) => page.rows) ?? [];
  const table = useCurrentRow(rows.length);
  const row = rows[table.current];
  const pick = (one: LotRow | undefined) =>
    one &&
    setPicked((was) => {
      const next = new Map(was);
      if (!next.delete(one.number)) next.set(one.number, one);
      return next;
    });
  const toMemo = () => void navigate(`/memos/new?lots=${[...picked.keys()].join(',')}`);
  useKeys([
    ...table.keys,
    {
      key: 'Space',
      says: 'unfold',
      act: () => setUnfolded(row && unfolded !== row.number ? row.number : null),
    },
    { key: 'X', says: 'select', act: () => pick(row) },
    { key: 'Enter', says: 'open lot', act: () => row && void navigate(`/lots/${row.number}`) },
    { key: 'S', says: 'edit sieve', act: () => sieveField.current?.focus() },
    ...(mayWrite ? [{ key: 'N', says: 'memo from selection', act: toMemo }] : []),
  ]);
  const set = (change: Record<string, string>) =>
    setSearch((was) => {
      for (const [name, value] of Object.entries(change))
        if (value) was.set(name, value);
        else was.delete(name);
      return was;
    });
  const count = sums.data
    ? `${sums.data.isCapped ? '10k+' : sums.data.lots.toLocaleString('en-US')} of ${sums.data.of >= 10_000 ? '10k+' : sums.data.of.toLocaleString('en-US')} pass the sieve`
    : '';
  return (
    <>
      <div className="head">
        <h1>Lots</h1>
        <span className="soft" aria-live="polite">
          {count}
        </span>
        <div className="acts">
          <SavedSieves sieve={sieve} onOpen={(saved) => setSearch(new URLSearchParams(saved))} />
          <a className="btn max-md:hidden" href={`/api/lots.csv?${sieve}`}>
            Export CSV
          </a>
          {mayTakeIn && (
            <Link className="btn" to="/lots/take-in">
              Take in a lot
            </Link>
          )}
          {mayWrite && (
            <button type="button" className="btn primary" onClick={toMemo}>
              {picked.size > 0 ? `Memo from selection (${picked.size})` : 'Write a memo'}{' '}
              <kbd>N</kbd>
            </button>
          )}
        </div>
      </div>
      <NarrowNotice what="The sieve with all its strips" />
      <SieveBar search={search} set={set} fieldRef={sieveField} />
      <Refused error={pages.error} />
      {sums.data?.lots === 0 && !pages.isPending ? (
        <p className="px-6 py-4 soft" role="status">
          {sums.data.of === 0 ? (
            <>
              No lots yet. <Link to="/lots/take-in">Take in one lot.</Link>
            </>
          ) : (
            `No lot passes this sieve. ${sums.data.hint ?? ''}`
          )}
        </p>
      ) : (
        <LotTable
          rows={rows}
          table={table}
          picked={picked}
          onPick={pick}
          unfolded={unfolded}
          sort={search.get('sort') ?? 'number'}
          onSort={(sort) => set({ sort })}
          hasMore={pages.hasNextPage}
          isMore={pages.isFetchingNextPage}
          onMore={() => void pages.fetchNextPage()}
        />
      )}
      {sums.data && sums.data.lots > 0 && <Foot sum={sums.data} />}
    </>
  );
}

function Foot({ sum }: { sum: LotSum }) {
  const {
    house: { priceCurrency: currency },
  } = useMe();
  return (
    <div className="foot small">
      <b>{sum.isCapped ? '10k+' : sum.lots} lots</b>
      <span>
        <b>{sum.pieces.toLocaleString('en-US')}</b> <span className="unit">pcs</span>
      </span>
      <span>
        <b>{formatCarats(sum.weight)}</b> <span className="unit">ct</span>
      </span>
      <span>
        <b>{formatAmount(sum.value, currency)}</b> <span className="unit">{currency} at ask</span>
      </span>
      {sum.cost !== undefined && (
        <span>
          <b>{formatAmount(sum.cost, currency)}</b> <span className="unit">{currency} cost</span>
        </span>
      )}
      <span className="grow" />
      <div className="w-[180px]">
        <BalanceBar parts={sum.bar} size="foot" />
      </div>
      <span>
        <b>
          safe {formatCarats(sum.bar.safe)}, out {formatCarats(sum.bar.out)}
        </b>{' '}
        <span className="unit">ct</span>
      </span>
    </div>
  );
}
