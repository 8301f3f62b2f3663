import type { AnswerRequest, DifferenceRow } from '@foldwell/contracts';
import { formatCarats, formatMoney, formatPoints, readCarats } from '@foldwell/quantities';
import { useState } from 'react';

import { Dialog } from '../../../components/dialog';
import { Field } from '../../../components/field';
import { Refused } from '../../../components/refused';
import { api } from '../../../lib/api-client';
import { useBookingKey } from '../../../lib/kept';
import { useKeys } from '../../../lib/keys';
import { useMay, useMe } from '../../../lib/session';

type Word = AnswerRequest['answer'];

/** The answers that fit each kind of difference, in words. */
const CLOSING: Record<DifferenceRow['kind'], [Word, string][]> = {
  short: [
    ['customer keeps it', 'The customer keeps it too'],
    ['accepted', 'Weighing difference accepted'],
    ['found again', 'Found again'],
    ['record corrected', 'Our record corrected'],
    ['written off', 'Written off'],
  ],
  'pieces short': [
    ['customer keeps it', 'The customer keeps them too'],
    ['accepted', 'Count difference accepted'],
    ['found again', 'Found again'],
    ['written off', 'Written off'],
  ],
  'not found': [
    ['customer keeps it', 'The customer keeps it'],
    ['found again', 'Found again'],
    ['record corrected', 'Our record corrected'],
    ['written off', 'Written off'],
  ],
  excess: [
    ['our short weighing', 'We had weighed it short'],
    ['their short weighing', 'Theirs, it came over'],
  ],
  'other weight': [
    ['accepted', 'The weight found is right'],
    ['found again', 'Our weight is right, weighed again'],
  ],
  'suspected switch': [
    ['other stone', 'Another stone, ours is still with them'],
    ['found again', 'A mistake, no switch'],
  ],
};

/** One difference: leave it open, or close it by somebody else than who weighed. */
export function AnswerPanel({ difference, onDone }: { difference: DifferenceRow; onDone(): void }) {
  const me = useMe();
  const mayAnswer = useMay('owner', 'bookkeeper');
  const isOwn = difference.openedById === me.id;
  const [key, nextKey] = useBookingKey();
  const [error, setError] = useState<unknown>();
  const [reason, setReason] = useState('');
  const [again, setAgain] = useState('');
  const [writesOff, setWritesOff] = useState(false);
  const off = difference.found - difference.expected;
  const refusal = !mayAnswer
    ? 'owner and bookkeeper only'
    : isOwn && difference.answerers.length > 0
      ? 'not by who weighed'
      : null;
  const post = async (path: string, body: object) => {
    setError(undefined);
    try {
      await api(`/differences/${difference.id}/${path}`, { method: 'POST', key, body });
      nextKey();
      onDone();
    } catch (problem) {
      nextKey(problem);
      setError(problem);
    }
  };
  const answer = (word: Word) =>
    word === 'written off'
      ? setWritesOff(true)
      : void post('answer', { answer: word, ...(reason.trim() && { reason }) });
  const closing = CLOSING[difference.kind];
  useKeys(
    refusal
      ? []
      : closing.map(([word, says], index) => ({
          key: String(index + 3),
          says: says.toLowerCase(),
          act: () => answer(word),
        })),
  );
  return (
    <div className="grid gap-3 content-start">
      <h2>
        {difference.lot}{' '}
        <span className="soft font-normal">
          {difference.what}, {difference.kind}
        </span>
      </h2>
      <div className="reading">
        <div>
          <span className="tiny">Expected</span>
          <br />
          <b>{formatCarats(difference.expected)}</b>
          <span className="unit">ct</span>
        </div>
        <div>
          <span className="tiny">Found</span>
          <br />
          <b className="red">{formatCarats(difference.found)}</b>
          <span className="unit">ct</span>
        </div>
        <div>
          <span className="tiny">{off < 0 ? 'Short' : off > 0 ? 'Over' : 'Pieces short'}</span>
          <br />
          <b className="red">
            {off === 0
              ? difference.heldPieces
              : formatPoints(Math.abs(off)).replace(/^\+/, '').replace(' pt', '')}
          </b>
          <span className="unit">{off === 0 ? 'pcs' : 'pt'}</span>
        </div>
      </div>
      {difference.cameLot && (
        <p className="note">
          What came lies in quarantine as {difference.cameLot}, theirs, without cost.
        </p>
      )}
      <h3>Leave it open</h3>
      <div className="flex gap-2 items-end">
        <Field
          label="Weigh again, every reading is kept"
          unit="ct"
          isNumber
          value={again}
          onValue={setAgain}
          className="grow"
        />
        <button
          type="button"
          className="btn"
          onClick={() => {
            const reading = readCarats(again, me.house.step, 'Reading');
            if (reading.kind === 'ok') {
              void post('weigh-again', { weight: reading.value });
              setAgain('');
            } else setError(new Error(reading.why));
          }}
        >
          Keep reading
        </button>
      </div>
      <div className="answers">
        <button type="button" onClick={() => void post('ask', {})}>
          <b>Ask the customer</b>
          <span className="soft">
            {difference.askedAt
              ? 'asked already; written down again'
              : 'written down with the memo'}
          </span>
        </button>
      </div>
      <h3>Close it</h3>
      {!refusal && <Field label="Reason, where one is due" value={reason} onValue={setReason} />}
      <div className="answers">
        {closing.map(([word, says], index) =>
          refusal ? (
            <p key={word} className="off">
              {says}, {refusal}
            </p>
          ) : (
            <button key={word} type="button" onClick={() => answer(word)}>
              <kbd>{index + 3}</kbd>
              <b>{says}</b>
              <span className="soft">
                {word === 'customer keeps it'
                  ? `${formatCarats(difference.held)} ct, ${formatMoney(difference.value, difference.currency)}`
                  : ''}
              </span>
            </button>
          ),
        )}
      </div>
      <p className="tiny quiet">
        {difference.openedBy} weighed it.{' '}
        {difference.answerers.length > 0
          ? `${difference.answerers.join(' or ')} answers.`
          : 'Nobody else active may answer, so the same person may, with a reason; verify lists it.'}
      </p>
      <Refused error={error} />
      {writesOff && (
        <WriteOff
          difference={difference}
          onLeave={() => setWritesOff(false)}
          onSure={(why) => {
            setWritesOff(false);
            void post('answer', { answer: 'written off', reason: why });
          }}
        />
      )}
    </div>
  );
}

/** A write-off can't be answered later: the carats are typed. */
function WriteOff({
  difference,
  onLeave,
  onSure,
}: {
  difference: DifferenceRow;
  onLeave(): void;
  onSure(reason: string): void;
}) {
  const [typed, setTyped] = useState('');
  const [reason, setReason] = useState('');
  const isSame = typed.trim().replace(/\s*ct$/, '') === formatCarats(difference.held);
  return (
    <Dialog
      title={`Write off ${formatCarats(difference.held)} ct of ${difference.lot}`}
      onLeave={onLeave}
    >
      <p>The carats leave the house for good, with their share of cost.</p>
      <Field label="Reason" value={reason} onValue={setReason} autoFocus />
      <Field
        label={`Type ${formatCarats(difference.held)} to write it off`}
        unit="ct"
        isNumber
        value={typed}
        onValue={setTyped}
      />
      <div className="flex gap-2">
        <button
          type="button"
          className="btn danger"
          disabled={!isSame || reason.trim() === ''}
          onClick={() => onSure(reason)}
        >
          Write off {formatCarats(difference.held)} ct
        </button>
        <button type="button" className="btn" onClick={onLeave}>
          Leave <kbd>Esc</kbd>
        </button>
      </div>
    </Dialog>
  );
}
