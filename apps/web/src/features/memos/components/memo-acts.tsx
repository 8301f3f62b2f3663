import type { MemoDetail, PartyRow } from '@foldwell/contracts';
import { addDays, formatCarats, readCarats, readMoney, readPieces } from '@foldwell/quantities';
import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';

import { Choice, Field } from '../../../components/field';
import { Refused } from '../../../components/refused';
import { api } from '../../../lib/api-client';
import { useBookingKey } from '../../../lib/kept';
import { useMay, useMe } from '../../../lib/session';

type Act = 'extend' | 're-price' | 'transfer' | 'keep' | 'un-keep' | 'void';
const ACTS: [Act, string, string][] = [
  ['extend', 'Extend', 'a new due date, with the reason'],
  ['re-price', 'Re-price', 'from today, both prices stay on the papers'],
  ['transfer', 'Transfer', 'back and out to another customer in one act'],
  ['keep', 'Keep', 'whole or part, becomes an invoice'],
  ['un-keep', 'Un-keep', 'on memo again, before it is invoiced'],
  ['void', 'Void', 'booked to the wrong party'],
];

/** What can be done with the memo or its selected lines; what can't says why. */
export function MemoActs({ memo, picked }: { memo: MemoDetail; picked: string[] }) {
  const [open, setOpen] = useState<Act | null>(null);
  const mayWrite = useMay('owner', 'dealer');
  const mayKeep = useMay('owner', 'dealer', 'bookkeeper');
  const refusal = (act: Act): string | null => {
    if (act === 'keep' || act === 'un-keep')
      return !mayKeep
        ? 'owner, dealer and bookkeeper only'
        : act === 'keep'
          ? memo.flows.out === 0
            ? 'nothing is still out'
            : null
          : memo.flows.kept === 0
            ? 'nothing is kept'
            : null;
    if (!mayWrite) return 'owner and dealer only';
    if (act === 'void') return memo.voidRefusal;
    return memo.flows.out === 0 ? 'nothing is still out' : null;
  };
  return (
    <>
      <h2>{picked.length > 0 ? `${picked.length} lines in hand` : 'The whole memo'}</h2>
      <div className="answers">
        {ACTS.map(([act, name, says]) => {
          const no = refusal(act);
          if (no)
            return (
              <p key={act} className="off">
                {name}, no: {no}
              </p>
            );
          return (
            <button
              key={act}
              type="button"
              aria-expanded={open === act}
              onClick={() => setOpen(open === act ? null : act)}
            >
              <b>{name}</b>
              <span className="soft">{says}</span>
            </button>
          );
        })}
      </div>
      {open && (
        <ActForm key={open} act={open} memo={memo} picked={picked} onDone={() => setOpen(null)} />
      )}
    </>
  );
}

function ActForm({
  act,
  memo,
  picked,
  onDone,
}: {
  act: Act;
  memo: MemoDetail;
  picked: string[];
  onDone(): void;
}) {
  const {
    house: { step },
  } = useMe();
  const isOwner = useMay('owner');
  const client = useQueryClient();
  const navigate = useNavigate();
  const [key, nextKey] = useBookingKey();
  const [error, setError] = useState<unknown>();
  const [form, setForm] = useState({
    due: addDays(memo.due, 7),
    reason: '',
    price: '',
    weight: '',
    pieces: '',
    party: '',
    release: '',
  });
  const parties = useQuery({
    queryKey: ['parties', 'customer'],
    queryFn: () => api<PartyRow[]>('/parties?part=customer'),
    enabled: act === 'transfer',
  });
  const text = (name: keyof typeof form) => ({
    value: form[name],
    onValue: (value: string) => setForm({ ...form, [name]: value }),
  });
  const lines = memo.lines.filter((line) => picked.length === 0 || picked.includes(line.lot));
  const subject = lines.filter((line) =>
    act === 'un-keep' ? line.flows.kept > 0 : line.flows.out > 0,
  );
  const isOne = subject.length === 1;
  const post = async () => {
    setError(undefined);
    try {
      const answer = await api<{ number?: string }>(`/memos/${memo.number}/${act}`, {
        method: 'POST',
        key,
        body: body(),
      });
      nextKey();
      await client.invalidateQueries();
      onDone();
      if (act === 'transfer' && answer.number) void navigate(`/memos/${answer.number}?booked=1`);
    } catch (problem) {
      nextKey(problem);
      setError(problem);
    }
  };
  const price = () => {
    if (form.price.trim() === '') return {};
    const reading = readMoney(form.price.replace(/^=/, ''), memo.currency, 'Price');
    if (reading.kind !== 'ok') throw new Error(reading.why);
    return form.price.startsWith('=') ? { sum: reading.value } : { price: reading.value };
  };
  const body = (): object => {
    if (act === 'extend')
      return { due: form.due, reason: form.reason, ...(picked.length > 0 && { lots: picked }) };
    if (act === 'void') return { reason: form.reason };
    if (act === 'transfer')
      return {
        party: form.party || parties.data?.find((one) => one.number !== memo.partyNumber)?.number,
        due: form.due,
        reason: form.reason,
        ...(form.release && { releaseReason: form.release }),
      };
    if (act === 're-price')
      return { reason: form.reason, lines: subject.map((line) => ({ lot: line.lot, ...price() })) };
    return {
      lines: subject.map((line) => {
        const whole =
          act === 'keep'
            ? { weight: line.flows.out, pieces: line.outPieces }
            : { weight: line.flows.kept, pieces: line.keptPieces };
        if (!isOne || form.weight.trim() === '') return { lot: line.lot, ...whole, ...price() };
        const weight = readCarats(form.weight, step);
        if (weight.kind !== 'ok') throw new Error(weight.why);
        const pieces =
          form.pieces.trim() === ''
            ? {
                kind: 'ok' as const,
                value: Math.max(1, Math.round((whole.pieces * weight.value) / whole.weight)),
              }
            : readPieces(form.pieces);
        if (pieces.kind !== 'ok') throw new Error(pieces.why);
        return { lot: line.lot, weight: weight.value, pieces: pieces.value, ...price() };
      }),
    };
  };
  const words = `${act[0]?.toUpperCase()}${act.slice(1)} ${formatCarats(subject.reduce((sum, line) => sum + (act === 'un-keep' ? line.flows.kept : line.flows.out), 0))} ct`;
  return (
    <div className="bg-paper p-3 grid gap-3">
      {act === 'transfer' && (
        <Choice
          label="To"
          {...text('party')}
          options={(parties.data ?? [])
            .filter((one) => one.number !== memo.partyNumber)
            .map((one) => [one.number, `${one.name}, C ${one.number}`] as const)}
        />
      )}
      {(act === 'extend' || act === 'transfer') && (
        <Field label="New due date" type="date" {...text('due')} />
      )}
      {(act === 'keep' || act === 'un-keep') && isOne && subject[0]?.lotKind === 'parcel' && (
        <div className="grid grid-cols-2 gap-3">
          <Field label="Weight, all without" unit="ct" isNumber {...text('weight')} />
          <Field label="Pieces" isNumber {...text('pieces')} />
        </div>
      )}
      {(act === 're-price' || act === 'keep') && (
        <Field
          label={act === 'keep' ? 'Newly agreed price, memo price without' : 'New price'}
          unit={`${memo.currency}/ct`}
          isNumber
          {...text('price')}
          help="A sum: begin with ="
        />
      )}
      {act !== 'keep' && act !== 'un-keep' && (
        <Field label="Reason, on the paper" {...text('reason')} />
      )}
      {act === 'transfer' && isOwner && (
        <Field label="If over their limit: why it may pass" {...text('release')} />
      )}
      <Refused error={error} />
      <button
        type="button"
        className="btn primary justify-self-end"
        disabled={
          subject.length === 0 ||
          (['extend', 're-price', 'void'].includes(act) && form.reason.trim() === '')
        }
        onClick={() => void post()}
      >
        {words}
      </button>
    </div>
  );
}
