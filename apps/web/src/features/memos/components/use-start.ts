import type { DraftLine, ReadLine } from '@foldwell/contracts';
import { useEffect, useRef } from 'react';

import { api } from '../../../lib/api-client';
import type { MemoDraft } from './memo-draft';

/** A memo begun from a selection of lots or from a customer's page. */
export function useStart(
  search: URLSearchParams,
  isReady: boolean,
  draft: MemoDraft,
  change: (part: Partial<MemoDraft>) => void,
): void {
  const isDone = useRef(false);
  useEffect(() => {
    if (isDone.current || !isReady) return;
    isDone.current = true;
    const party = draft.party || (search.get('party') ?? '');
    if (party !== draft.party) change({ party });
    const has = new Set(draft.lines.map((line) => line.lot));
    const lots = (search.get('lots') ?? '').split(',').filter((lot) => lot && !has.has(lot));
    if (lots.length > 0) {
      void readLots(lots, party).then((lines) => change({ lines: [...draft.lines, ...lines] }));
    }
  }, [search, isReady, draft, change]);
}

async function readLots(lots: string[], party: string): Promise<DraftLine[]> {
  const lines: DraftLine[] = [];
  for (const text of lots) {
    const read = await api<ReadLine>('/memo-lines/read', {
      method: 'POST',
      body: { text, party, lines: [] },
    });
    if (read.line) lines.push(read.line);
  }
  return lines;
}
