import { useState } from 'react';

import { Dialog } from '../../../components/dialog';
import { Field } from '../../../components/field';
import { Refused } from '../../../components/refused';
import { api } from '../../../lib/api-client';
import { useBookingKey } from '../../../lib/kept';

/** Undoes the newest booking by its mirror, with a reason; where that can't be, what came later is named. */
export function UndoMovement({
  movement,
  onDone,
  onLeave,
}: {
  movement: { movementId: string; what: string };
  onDone(): void;
  onLeave(): void;
}) {
  const [reason, setReason] = useState('');
  const [error, setError] = useState<unknown>();
  const [key] = useBookingKey();
  const undo = async () => {
    try {
      await api(`/movements/${movement.movementId}/reverse`, {
        method: 'POST',
        key,
        body: { reason },
      });
      onDone();
    } catch (problem) {
      setError(problem);
    }
  };
  return (
    <Dialog title="Undo a booking" onLeave={onLeave}>
      <p>{movement.what}. A mirror entry is written; nothing is erased.</p>
      <Field label="Reason" value={reason} onValue={setReason} autoFocus />
      <Refused error={error} />
      <div className="flex gap-2">
        <button
          type="button"
          className="btn danger"
          disabled={reason.trim() === ''}
          onClick={() => void undo()}
        >
          Undo it
        </button>
        <button type="button" className="btn" onClick={onLeave}>
          Leave <kbd>Esc</kbd>
        </button>
      </div>
    </Dialog>
  );
}
