import type { BookedMemo, House, PartyRow, ReadLine } from '@foldwell/contracts';
import { addDays, formatCarats, formatMoney } from '@foldwell/quantities';
import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useEffect, useRef, useState } from 'react';
import { useNavigate, useParams, useSearchParams } from 'react-router-dom';

import { BalanceBar } from '../../../components/balance-bar';
import { Choice, Field } from '../../../components/field';
import { Refused } from '../../../components/refused';
import { api } from '../../../lib/api-client';
import { useBookingKey } from '../../../lib/kept';
import { useKeys } from '../../../lib/keys';
import { useMay, useMe } from '../../../lib/session';
import { DraftLines } from './draft-lines';
import { ExposurePanel, usePreview } from './exposure-panel';
import { linesToBook } from './memo-draft';
import { OnThePaper } from './on-the-paper';
import { ScanLine, type ScanLineHandle } from './scan-line';
import { useMemoDraft } from './use-memo-draft';

/** Book stones out: scan, carats, price; exposure grows as you write; Ctrl Enter books. */
export function WriteMemoPage() {
  const { id: openId } = useParams();
  const [search] = useSearchParams();
  const { house } = useMe();
  const mayWrite = useMay('owner', 'dealer');
  const isOwner = useMay('owner');
  const navigate = useNavigate();
  const client = useQueryClient();
  const { draft, change, state, keepNow, forget, isReady } = useMemoDraft(openId);
  const scan = useRef<ScanLineHandle>(null);
  const [error, setError] = useState<unknown>();
  const [reason, setReason] = useState('');
  const [key, nextKey] = useBookingKey();
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
  useStart(
    search,
    isReady,
    draft.lines.map((line) => line.lot),
    draft.party,
    change,
  );

  const isOver = Boolean(
    preview && (preview.overBy > 0 || preview.overMemoBy > 0 || preview.lapsed),
  );
  const cannot =
    draft.party === ''
      ? 'Choose the customer first.'
      : draft.lines.length === 0
        ? 'Add a line first.'
        : draft.lines.some((line) => line.price === null && line.sum === null)
          ? 'A line has no price yet; type its lot with @ and the price.'
          : isOver && !isOwner
            ? `Book out waits for ${preview?.owners[0] ?? 'an owner'}.`
            : isOver && reason.trim() === ''
              ? 'Write why it may pass; that is your release.'
              : null;
  const book = async () => {
    if (cannot && !(isOver && !isOwner)) return;
    setError(undefined);
    try {
      const draftId = await keepNow();
      const { handedTo, carriedBy, terms, remarks, party, pricesUntil, lines } = draft;
      const booked = await api<BookedMemo>('/memos', {
        method: 'POST',
        key,
        body: {
          party,
          due,
          handedTo,
          carriedBy,
          terms,
          remarks,
          ...(pricesUntil && { pricesUntil }),
          ...(draftId && { draftId }),
          ...(reason && { releaseReason: reason }),
          lines: linesToBook(lines),
        },
      });
      nextKey();
      forget();
      await client.invalidateQueries();
      void navigate(`/memos/${booked.number}?booked=1`);
    } catch (problem) {
      nextKey();
      setError(problem);
    }
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
        says: isOver && !isOwner ? 'ask the owner' : 'book out',
        act: () => void book(),
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
      <section className="flex flex-wrap gap-3 px-6 pb-3 border-b border-crease-2">
        <Choice
          label="Customer"
          value={draft.party}
          onValue={(party) => change({ party })}
          className="w-[250px]"
          options={[
            ['', 'choose'],
            ...(customers.data ?? []).map(
              (one) => [one.number, `${one.name}, C ${one.number}`] as const,
            ),
          ]}
        />
        <Field
          label="Handed to"
          value={draft.handedTo}
          onValue={(handedTo) => change({ handedTo })}
          className="w-[150px]"
        />
        <Field
          label="Terms"
          value={draft.terms}
          onValue={(terms) => change({ terms })}
          className="w-[180px]"
          placeholder={`${rules.data?.memoDays ?? 14} days`}
        />
        <Field
          label="Due back"
          type="date"
          value={due}
          onValue={(value) => change({ due: value })}
          className="w-[150px]"
        />
        <Field
          label="Prices held until"
          type="date"
          value={draft.pricesUntil || due}
          onValue={(pricesUntil) => change({ pricesUntil })}
          className="w-[150px]"
        />
        <Field
          label="Carried by"
          value={draft.carriedBy}
          onValue={(carriedBy) => change({ carriedBy })}
          className="grow min-w-[160px]"
        />
      </section>
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
          disabled={Boolean(cannot) && !(isOver && !isOwner)}
          onClick={() => void book()}
        >
          {isOver && !isOwner
            ? `Ask ${preview?.owners[0] ?? 'the owner'}`
            : `Book out ${formatCarats(weight)} ct`}{' '}
          <kbd>Ctrl Enter</kbd>
        </button>
      </section>
    </>
  );
}

/** A memo begun from a selection of lots or from a customer's page. */
function useStart(
  search: URLSearchParams,
  isReady: boolean,
  has: string[],
  party: string,
  change: (part: { party?: string; lines?: never[] } & Record<string, unknown>) => void,
): void {
  const done = useRef(false);
  useEffect(() => {
    if (done.current || !isReady) return;
    done.current = true;
    const wanted = search.get('party');
    if (wanted && !party) change({ party: wanted });
    const lots = (search.get('lots') ?? '').split(',').filter((lot) => lot && !has.includes(lot));
    if (lots.length === 0) return;
    void (async () => {
      const lines: NonNullable<ReadLine['line']>[] = [];
      for (const text of lots) {
        const read = await api<ReadLine>('/memo-lines/read', {
          method: 'POST',
          body: { text, party: wanted ?? party, lines: [] },
        });
        if (read.line) lines.push(read.line);
      }
      if (lines.length > 0) change({ lines: lines as never[] });
    })();
  }, [search, isReady, has, party, change]);
}
