import type { DraftRow, MemoRow } from '@foldwell/contracts';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useNavigate } from 'react-router-dom';

import { DueLine } from '../../../components/due-line';
import { Choice, Field } from '../../../components/field';
import { Loaded } from '../../../components/loading';
import { MemoTable } from '../../../components/memo-table';
import { useCurrentRow } from '../../../components/row-keys';
import { api } from '../../../lib/api-client';
import { useKeys } from '../../../lib/keys';
import { useMay, useMe } from '../../../lib/session';

/** Every memo by due date, with the due line; drafts stand apart, they hold no carats. */
export function MemosPage() {
  const [state, setState] = useState('open');
  const [q, setQ] = useState('');
  const {
    house: { today },
  } = useMe();
  const mayWrite = useMay('owner', 'dealer');
  const query = useQuery({
    queryKey: ['memos', state, q],
    queryFn: () => api<MemoRow[]>(`/memos?state=${state}&q=${encodeURIComponent(q)}`),
    placeholderData: (before) => before,
  });
  return (
    <>
      <div className="head">
        <h1>Memos</h1>
        <span className="soft">{query.data ? `${query.data.length} ${state}` : ''}</span>
        <div className="acts items-end">
          <Choice
            label="Show"
            value={state}
            onValue={setState}
            options={[
              ['open', 'open'],
              ['late', 'late'],
              ['settled', 'settled and void'],
              ['all', 'all'],
            ]}
          />
          <Field label="Customer or number" value={q} onValue={setQ} />
          {mayWrite ? (
            <Link className="btn primary" to="/memos/new">
              Write a memo <kbd>N</kbd>
            </Link>
          ) : (
            <span className="quiet small">Writing memos is for owner and dealer.</span>
          )}
        </div>
      </div>
      {state !== 'settled' && query.data && (
        <section className="bg-pad border-y border-crease-2 px-6 pt-1 max-md:hidden">
          <DueLine memos={query.data} today={today} />
        </section>
      )}
      <Drafts />
      <Loaded query={query} says="Laying out the memos.">
        {(memos) => <Table memos={memos} today={today} />}
      </Loaded>
    </>
  );
}

function Table({ memos, today }: { memos: MemoRow[]; today: string }) {
  const navigate = useNavigate();
  const mayWrite = useMay('owner', 'dealer');
  const rows = useCurrentRow(memos.length);
  useKeys([
    ...rows.keys,
    {
      key: 'Enter',
      says: 'open',
      act: () => {
        const memo = memos[rows.current];
        if (memo) void navigate(`/memos/${memo.number}`);
      },
    },
    {
      key: 'R',
      says: 'take back',
      act: () => {
        const memo = memos[rows.current];
        if (memo) void navigate(`/returns/${memo.number}`);
      },
    },
    ...(mayWrite
      ? [{ key: 'N', says: 'write a memo', act: () => void navigate('/memos/new') }]
      : []),
  ]);
  if (memos.length === 0)
    return <p className="px-6 py-4 soft">No memo here. Choose another state, or write one.</p>;
  return (
    <div className="scroll flex-1">
      <MemoTable memos={memos} today={today} rows={rows} />
    </div>
  );
}

function Drafts() {
  const { data = [] } = useQuery({
    queryKey: ['drafts'],
    queryFn: () => api<DraftRow[]>('/drafts'),
  });
  if (data.length === 0) return null;
  return (
    <section className="px-6 py-2 border-b border-crease" aria-label="Drafts">
      {data.map((draft) => (
        <p key={draft.id} className="small py-[2px]">
          <span className="status">
            <span className="swatch offered" />
            Draft
          </span>{' '}
          <Link to={`/memos/draft/${draft.id}`}>
            {draft.party ?? 'no customer yet'}, {draft.lines} lines
          </Link>{' '}
          <span className="quiet">by {draft.by}</span>{' '}
          {draft.waitsBecause && <span className="red">waits: {draft.waitsBecause}</span>}
        </p>
      ))}
    </section>
  );
}
