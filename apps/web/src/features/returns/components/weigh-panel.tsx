import type { MemoDetail, MemoLine, WeighedBack } from '@foldwell/contracts';
import { formatCarats, formatPoints } from '@foldwell/quantities';
import { useQueryClient } from '@tanstack/react-query';
import { type FormEvent, useEffect, useRef, useState } from 'react';

import { Field } from '../../../components/field';
import { Refused } from '../../../components/refused';
import { api } from '../../../lib/api-client';
import { useBookingKey, useKept } from '../../../lib/kept';
import { useMe } from '../../../lib/session';
import { EMPTY_FORM, readWeighForm } from './weigh-form';
import { WhoseStone } from './whose-stone';

/** One line on the balance: what is read is posted with each Enter; a stone that disagrees is asked about first. */
export function WeighPanel({
  memo,
  line,
  onDone,
}: {
  memo: MemoDetail;
  line: MemoLine;
  onDone(outcome: WeighedBack): void;
}) {
  const {
    house: { step },
  } = useMe();
  const client = useQueryClient();
  const [form, change, forget] = useKept(`weigh ${memo.number} ${line.lot}`, EMPTY_FORM);
  const [asks, setAsks] = useState<WeighedBack | null>(null);
  const [error, setError] = useState<unknown>();
  const [problem, setProblem] = useState<string>();
  const [key, nextKey] = useBookingKey();
  const input = useRef<HTMLInputElement>(null);
  useEffect(() => {
    input.current?.focus();
  }, []);
  const isStone = line.lotKind !== 'parcel';
  const read = readWeighForm(form, line, step);
  const { found, coming, rest } = read;
  const off = found === null ? null : found - coming.weight;
  const post = async (decision?: 'ours' | 'not ours' | 'not found') => {
    setError(undefined);
    setProblem(undefined);
    if (read.why) return setProblem(read.why);
    if (found === null && decision !== 'not found')
      return setProblem('Type what the balance reads.');
    try {
      const outcome = await api<WeighedBack>(`/memos/${memo.number}/returns`, {
        method: 'POST',
        key,
        body: {
          lot: line.lot,
          weight: found ?? 0,
          ...(read.pieces !== null && { pieces: read.pieces }),
          ...(rest.weight > 0 && { expected: coming.weight, expectedPieces: coming.pieces }),
          ...(form.report.trim() && { reportRead: form.report.trim() }),
          ...(decision && { decision }),
        },
      });
      if (outcome.outcome === 'asks') return setAsks(outcome);
      nextKey();
      forget();
      setAsks(null);
      onDone(outcome);
    } catch (refusal) {
      nextKey(refusal);
      setError(refusal);
    }
  };
  const kept = rest.weight > 0 ? rest : coming;
  const keepIt = async () => {
    setProblem(read.why ?? undefined);
    if (read.why) return;
    try {
      await api(`/memos/${memo.number}/keep`, {
        method: 'POST',
        key,
        body: { lines: [{ lot: line.lot, ...kept }] },
      });
      nextKey();
      change({ coming: '', comingPieces: '' });
      await client.invalidateQueries();
    } catch (refusal) {
      nextKey(refusal);
      setError(refusal);
    }
  };
  if (line.flows.out === 0)
    return (
      <p>
        <b>{line.lot}</b> is settled on this memo. Choose a line that is still out.
      </p>
    );
  return (
    <form
      className="grid gap-3 content-start"
      onSubmit={(event: FormEvent) => {
        event.preventDefault();
        void post();
      }}
    >
      <h2>
        {line.lot} <span className="soft font-normal">{line.what}</span>
      </h2>
      <div className="reading" aria-live="polite">
        <div>
          <span className="tiny">Expected</span>
          <br />
          <b>{formatCarats(coming.weight)}</b>
          <span className="unit">ct</span>
        </div>
        <div>
          <span className="tiny">Found</span>
          <br />
          <b
            className={
              off !== null && Math.abs(off) > (isStone ? memo.stoneTolerance : memo.parcelTolerance)
                ? 'red'
                : ''
            }
          >
            {found === null ? '–' : formatCarats(found)}
          </b>
          <span className="unit">ct</span>
        </div>
        <div>
          <span className="tiny">
            {off === null ? 'Off' : off < 0 ? 'Short' : off > 0 ? 'Over' : 'Level'}
          </span>
          <br />
          <b>
            {off === null ? '–' : formatPoints(Math.abs(off)).replace(/^\+/, '').replace(' pt', '')}
          </b>
          <span className="unit">pt</span>
        </div>
      </div>
      <Field
        ref={input}
        label="Found on the balance"
        unit="ct"
        isNumber
        value={form.found}
        onValue={(found) => {
          change({ found });
          setAsks(null);
        }}
        problem={problem}
      />
      <div className="grid grid-cols-2 gap-3">
        <Field
          label={line.isEstimated ? 'Pieces, about, follow weight' : 'Pieces counted'}
          unit="pcs"
          isNumber
          value={form.pieces}
          onValue={(pieces) => change({ pieces })}
          placeholder={String(coming.pieces)}
        />
        {isStone && (
          <Field
            label="Report or inscription read"
            data-scans
            value={form.report}
            onValue={(report) => {
              change({ report });
              setAsks(null);
            }}
            placeholder={line.report || 'none on ours'}
          />
        )}
      </div>
      {!isStone && (
        <div className="grid grid-cols-2 gap-3">
          <Field
            label="Comes back now, the rest stays out"
            unit="ct"
            isNumber
            value={form.coming}
            onValue={(text) => change({ coming: text })}
            placeholder={formatCarats(line.flows.out)}
          />
          {!line.isEstimated && (
            <Field
              label="Pieces of it"
              unit="pcs"
              isNumber
              value={form.comingPieces}
              onValue={(comingPieces) => change({ comingPieces })}
              placeholder={String(line.outPieces)}
            />
          )}
        </div>
      )}
      {asks && <WhoseStone asks={asks} onTell={(decision) => void post(decision)} />}
      <Refused error={error} />
      <button type="submit" className="btn primary justify-self-start">
        Take and next <kbd>Enter</kbd>
      </button>
      <div className="answers pt-2">
        <button type="button" onClick={() => void keepIt()}>
          <b>Customer keeps</b>
          <span className="soft">
            {rest.weight > 0 ? 'the rest' : 'all that is out'}, {formatCarats(kept.weight)} ct
          </span>
        </button>
        {isStone && (
          <button type="button" onClick={() => void post('not found')}>
            <b>Not found</b>
            <span className="soft">the paper came back without it</span>
          </button>
        )}
      </div>
    </form>
  );
}
