import type { House, PartyRow } from '@foldwell/contracts';
import { addDays, formatCarats, formatMoney } from '@foldwell/quantities';
import { useQuery } from '@tanstack/react-query';
import { useRef, useState } from 'react';
import { useNavigate, useParams, useSearchParams } from 'react-router-dom';

import { BalanceBar } from '../../../components/balance-bar';
import { Refused } from '../../../components/refused';
import { api } from '../../../lib/api-client';
import { useKeys } from '../../../lib/keys';
import { useMay, useMe } from '../../../lib/session';
import { DraftLines } from './draft-lines';
import { ExposurePanel, usePreview } from './exposure-panel';
import { MemoHead } from './memo-head';
import { OnThePaper } from './on-the-paper';
import { readiness } from './readiness';
import { ScanLine, type ScanLineHandle } from './scan-line';
import { useBookMemo } from './use-book-memo';
import { useMemoDraft } from './use-memo-draft';
import { useStart } from './use-start';

/** Book stones out: scan, carats, price; exposure grows as you write; Ctrl Enter books. */
export function WriteMemoPage() {
  const { id: openId } = useParams();
  const [search] = useSearchParams();
  const { house } = useMe();
  const mayWrite = useMay('owner', 'dealer');
  const isOwner = useMay('owner');
  const navigate = useNavigate();
  const { draft, change, state, keepNow, forget, isReady } = useMemoDraft(openId);
  const scan = useRef<ScanLineHandle>(null);
  const [reason, setReason] = useState('');
  const customers = useQuery({
    queryKey: ['parties', 'customer'],
    queryFn: () => api<PartyRow[]>('/parties?part=customer'),
  });
  const rules = useQuery({ queryKey: ['house'], queryFn: () => api<House>('/house') });
  const due = draft.due || addDays(house.today, rules.data?.memoDays ?? 14);
  const currency =
    customers.data?.find((one) => one.number === draft.party)?.exposure.currency ??
    house.priceCurrency;
  const preview = usePreview(draft, due);
  useStart(search, isReady, draft, change);

  const { isOver, cannot } = readiness(draft, preview, { isOwner, reason });
  const mustAsk = isOver && !isOwner;
  const { error, book } = useBookMemo({ draft, due, reason, keepNow, forget });
  const tryToBook = () => {
    if (!cannot || mustAsk) void book();
  };
  const putAside = () =>
    void keepNow().then(() => {
      forget();
      void navigate('/memos');
    });
  useKeys(
    [
      { key: 'Enter', says: 'add line', act: () => scan.current?.focus() },
      {
        key: 'Ctrl Enter',
        says: mustAsk ? 'ask the owner' : 'book out',
        act: tryToBook,
        inFields: true,
      },
      {
        key: 'Ctrl ↑',
        says: 'edit last line',
        act: () => scan.current?.editLast(),
        inFields: true,
      },
      { key: 'Esc', says: 'put aside as draft', act: putAside },
    ],
    state,
  );
  if (!mayWrite) return <p className="p-6">Writing memos, owner and dealer only. Ask an owner.</p>;
  const weight = draft.lines.reduce((sum, line) => sum + line.weight, 0);
  const amount = draft.lines.reduce((sum, line) => sum + line.amount, 0);
  return (
    <>
      <div className="head">
        <h1>Write a memo</h1>
        <span className="soft status">
          <span className="swatch offered" />
          draft, not booked; the number comes at booking
        </span>
        <div className="acts">
          <button type="button" className="btn" onClick={putAside}>
            Put aside <kbd>Esc</kbd>
          </button>
        </div>
      </div>
      <MemoHead
        draft={draft}
        change={change}
        due={due}
        days={rules.data?.memoDays ?? 14}
        customers={customers.data ?? []}
      />
      <section className="grid lg:grid-cols-[minmax(0,1fr)_440px] lg:flex-1 lg:min-h-0">
        <div className="min-w-0 flex flex-col gap-3 lg:overflow-auto max-lg:overflow-x-auto pb-4">
          <DraftLines
            lines={draft.lines}
            currency={currency}
            onDrop={(lot) => change({ lines: draft.lines.filter((line) => line.lot !== lot) })}
            onEdit={(line) => scan.current?.edit(line)}
          />
          <ScanLine ref={scan} draft={draft} change={change} />
          <div className="px-6">
            <Refused error={error} title="Not booked." />
          </div>
          <OnThePaper
            draft={draft}
            due={due}
            customer={
              customers.data?.find((one) => one.number === draft.party)?.name ?? 'the customer'
            }
            house={rules.data}
          />
        </div>
        <ExposurePanel
          preview={preview}
          lines={draft.lines}
          weight={weight}
          onCut={(to) => scan.current?.cutLast(to)}
          reason={reason}
          onReason={setReason}
        />
      </section>
      <section className="foot">
        <div className="w-[180px] max-md:hidden">
          <BalanceBar parts={{ out: weight }} size="foot" />
        </div>
        <span className="big">
          {draft.lines.length} lots, {formatCarats(weight)} <span className="unit">ct</span>
        </span>
        <span className="big">{formatMoney(amount, currency)}</span>
        <span className="grow" />
        {cannot && <span className={isOver ? 'red' : 'quiet'}>{cannot}</span>}
        <button
          type="button"
          className="btn primary"
          disabled={Boolean(cannot) && !mustAsk}
          onClick={tryToBook}
        >
          {mustAsk
            ? `Ask ${preview?.owners[0] ?? 'the owner'}`
            : `Book out ${formatCarats(weight)} ct`}{' '}
          <kbd>Ctrl Enter</kbd>
        </button>
      </section>
    </>
  );
}
