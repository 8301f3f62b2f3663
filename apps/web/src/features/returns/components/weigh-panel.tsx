import type { MemoDetail, MemoLine, WeighedBack } from '@foldwell/contracts';
import { formatCarats, formatPoints, readCarats, readPieces } from '@foldwell/quantities';
import { useQueryClient } from '@tanstack/react-query';
import { type FormEvent, useEffect, useRef, useState } from 'react';

import { Field } from '../../../components/field';
import { Refused } from '../../../components/refused';
import { api } from '../../../lib/api-client';
import { useBookingKey, useKept } from '../../../lib/kept';
import { useMe } from '../../../lib/session';

const EMPTY = { found: '', pieces: '', report: '' };

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
  const [form, change, forget] = useKept(`weigh ${memo.number} ${line.lot}`, EMPTY);
  const [asks, setAsks] = useState<WeighedBack | null>(null);
  const [error, setError] = useState<unknown>();
  const [problem, setProblem] = useState<string>();
  const [key, nextKey] = useBookingKey();
  const input = useRef<HTMLInputElement>(null);
  useEffect(() => {
    input.current?.focus();
  }, []);
  const isStone = line.lotKind !== 'parcel';
  const reading =
    form.found.trim() === ''
      ? null
      : /^0+([.,]0+)?$/.test(form.found.trim())
        ? { kind: 'ok' as const, value: 0 }
        : readCarats(form.found, step, 'Found');
  const off = reading?.kind === 'ok' ? reading.value - line.flows.out : null;
  const post = async (decision?: 'ours' | 'not ours' | 'not found') => {
    setError(undefined);
    setProblem(undefined);
    if (!reading && decision !== 'not found') return setProblem('Type what the balance reads.');
    if (reading && reading.kind !== 'ok') return setProblem(reading.why);
    const pieces =
      form.pieces.trim() === ''
        ? null
        : form.pieces.trim() === '0'
          ? { kind: 'ok' as const, value: 0 }
          : readPieces(form.pieces);
    if (pieces && pieces.kind !== 'ok') return setProblem(pieces.why);
    try {
      const outcome = await api<WeighedBack>(`/memos/${memo.number}/returns`, {
        method: 'POST',
        key,
        body: {
          lot: line.lot,
          weight: reading?.value ?? 0,
          ...(pieces && { pieces: pieces.value }),
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
  const keepAll = async () => {
    try {
      await api(`/memos/${memo.number}/keep`, {
        method: 'POST',
        key,
        body: { lines: [{ lot: line.lot, weight: line.flows.out, pieces: line.outPieces }] },
      });
      nextKey();
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
          <b>{formatCarats(line.flows.out)}</b>
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
            {reading?.kind === 'ok' ? formatCarats(reading.value) : '–'}
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
          placeholder={String(line.outPieces)}
        />
        {isStone && (
          <Field
            label="Report or inscription read"
            value={form.report}
            onValue={(report) => {
              change({ report });
              setAsks(null);
            }}
            placeholder={line.report || 'none on ours'}
          />
        )}
      </div>
      {asks && (
        <div className="note warn grid gap-2" role="alertdialog" aria-label="Whose stone is it">
          <h3 className="red">{asks.says}</h3>
          <div className="answers">
            <button type="button" onClick={() => void post('ours')}>
              <b>Ours, weighs otherwise</b>
              <span className="soft">whole to quarantine</span>
            </button>
            <button type="button" onClick={() => void post('not ours')}>
              <b>Not ours</b>
              <span className="soft">suspected switch; ours stays on the memo</span>
            </button>
          </div>
          <p className="tiny">
            Suspected, not proven: seal it, call a second witness, speak to insurer and counsel
            before accusing.
          </p>
        </div>
      )}
      <Refused error={error} />
      <button type="submit" className="btn primary justify-self-start">
        Take and next <kbd>Enter</kbd>
      </button>
      <div className="answers pt-2">
        <button type="button" onClick={() => void keepAll()}>
          <b>Customer keeps</b>
          <span className="soft">all that is out, {formatCarats(line.flows.out)} ct</span>
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
