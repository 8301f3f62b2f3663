import type { BookedMemo } from '@foldwell/contracts';
import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';

import { api } from '../../../lib/api-client';
import { useBookingKey } from '../../../lib/kept';
import { linesToBook, type MemoDraft } from './memo-draft';

interface ToBook {
  draft: MemoDraft;
  due: string;
  reason: string;
  keepNow(): Promise<string | null>;
  forget(): void;
}

/** Books the draft out; a refusal leaves it as it was typed, and opens the memo when it is done. */
export function useBookMemo({ draft, due, reason, keepNow, forget }: ToBook) {
  const navigate = useNavigate();
  const client = useQueryClient();
  const [error, setError] = useState<unknown>();
  const [key, settled] = useBookingKey();
  const book = async () => {
    setError(undefined);
    try {
      const draftId = await keepNow();
      const { lines, scan: _scan, pricesUntil, ...head } = draft;
      const booked = await api<BookedMemo>('/memos', {
        method: 'POST',
        key,
        body: {
          ...head,
          due,
          ...(pricesUntil && { pricesUntil }),
          ...(draftId && { draftId }),
          ...(reason && { releaseReason: reason }),
          lines: linesToBook(lines),
        },
      });
      settled();
      forget();
      await client.invalidateQueries();
      void navigate(`/memos/${booked.number}?booked=1`);
    } catch (problem) {
      settled(problem);
      setError(problem);
    }
  };
  return { error, book };
}
