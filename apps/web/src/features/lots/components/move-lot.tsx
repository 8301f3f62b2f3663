import type { LotDetail, PlaceRow } from '@foldwell/contracts';
import { formatCarats, readCarats, readPieces } from '@foldwell/quantities';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';

import { Choice, Field } from '../../../components/field';
import { Refused } from '../../../components/refused';
import { api } from '../../../lib/api-client';
import { useBookingKey } from '../../../lib/kept';
import { useKeys } from '../../../lib/keys';
import { useMe } from '../../../lib/session';

const FROM = ['drawer', 'show', 'person', 'return desk', 'quarantine', 'laboratory', 'workshop'];
const TO = ['drawer', 'show', 'person'];

/** From a drawer, the desk or a person to a drawer or a person who carries goods. */
export function MoveLot({
  lot,
  onDone,
  onLeave,
}: {
  lot: LotDetail;
  onDone(): void;
  onLeave(): void;
}) {
  const {
    house: { step },
  } = useMe();
  const { data: places = [] } = useQuery({
    queryKey: ['places'],
    queryFn: () => api<PlaceRow[]>('/places'),
  });
  const sources = lot.places.filter((place) => FROM.includes(place.kind));
  const [from, setFrom] = useState(sources[0]?.placeId ?? '');
  const [to, setTo] = useState('');
  const source = sources.find((place) => place.placeId === from);
  const [weight, setWeight] = useState('');
  const [pieces, setPieces] = useState('');
  const [error, setError] = useState<unknown>();
  const [key, nextKey] = useBookingKey();
  const isParcel = lot.row.kind === 'parcel';
  const move = async () => {
    if (!source) return;
    const carats =
      isParcel && weight ? readCarats(weight, step) : { kind: 'ok' as const, value: source.weight };
    const count =
      isParcel && weight
        ? pieces
          ? readPieces(pieces)
          : {
              kind: 'ok' as const,
              value: Math.max(
                1,
                Math.round(
                  (source.pieces * (carats.kind === 'ok' ? carats.value : 1)) / source.weight,
                ),
              ),
            }
        : { kind: 'ok' as const, value: source.pieces };
    if (carats.kind !== 'ok') return setError(new Error(carats.why));
    if (count.kind !== 'ok') return setError(new Error(count.why));
    try {
      const isDesk = source.kind === 'return desk' || source.kind === 'quarantine';
      const lines = [
        {
          lot: lot.row.number,
          from,
          weight: carats.value,
          pieces: count.value,
        },
      ];
      await api(isDesk ? '/put-away' : '/transfers', {
        method: 'POST',
        key,
        body: { to: to || targets[0]?.id, lines },
      });
      nextKey();
      onDone();
    } catch (problem) {
      setError(problem);
    }
  };
  const targets = places.filter(
    (place) => TO.includes(place.kind) && !place.isClosed && place.id !== from,
  );
  useKeys([
    { key: 'Ctrl Enter', says: 'move', act: () => void move(), inFields: true },
    { key: 'Esc', says: 'leave', act: onLeave },
  ]);
  if (sources.length === 0)
    return (
      <p className="note mx-6 my-3">
        Nothing of {lot.row.number} lies where it could be moved from. It comes back at the return
        desk.
      </p>
    );
  return (
    <section
      className="bg-tissue px-6 py-4 grid gap-3 border-b border-crease-2"
      aria-label={`Move ${lot.row.number}`}
    >
      <h2>Move {lot.row.number}</h2>
      <div className="flex flex-wrap gap-3 items-end">
        <Choice
          label="From"
          value={from}
          onValue={setFrom}
          options={sources.map(
            (place) => [place.placeId, `${place.name}, ${formatCarats(place.weight)} ct`] as const,
          )}
          className="w-[240px]"
        />
        <Choice
          label="To"
          value={to || (targets[0]?.id ?? '')}
          onValue={setTo}
          options={targets.map((place) => [place.id, place.words] as const)}
          className="w-[240px]"
        />
        {isParcel && (
          <>
            <Field
              label="Weight, all without"
              unit="ct"
              isNumber
              value={weight}
              onValue={setWeight}
              className="w-[150px]"
            />
            <Field
              label="Pieces"
              isNumber
              value={pieces}
              onValue={setPieces}
              className="w-[110px]"
            />
          </>
        )}
        <button type="button" className="btn primary" onClick={() => void move()}>
          Move <kbd>Ctrl Enter</kbd>
        </button>
        <button type="button" className="btn" onClick={onLeave}>
          Leave <kbd>Esc</kbd>
        </button>
      </div>
      {targets.find((place) => place.id === to)?.kind === 'person' && (
        <p className="note">As entered; ask your insurer whether hand carriage is covered.</p>
      )}
      <Refused error={error} />
    </section>
  );
}
