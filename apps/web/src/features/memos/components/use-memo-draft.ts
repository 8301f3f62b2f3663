import { useCallback, useEffect, useRef, useState } from 'react';

import { api, Problem } from '../../../lib/api-client';
import { useMe } from '../../../lib/session';
import { EMPTY_DRAFT, type MemoDraft } from './memo-draft';

const KEEPS_AFTER_MS = 700;

interface Stored {
  id: string | null;
  version: number;
  draft: MemoDraft;
}

interface KeptDraft {
  draft: MemoDraft;
  change(part: Partial<MemoDraft>): void;
  /** What is said at the right of the key line. */
  state: string;
  keepNow(): Promise<string | null>;
  forget(): void;
  isReady: boolean;
}

/**
 * A draft that is never lost: in this browser at once, in the house a moment later. Without a
 * connection it stays here and says so.
 */
export function useMemoDraft(openId: string | undefined): KeptDraft {
  const local = `foldwell memo draft ${useMe().id}`;
  const [stored, setStored] = useState<Stored>(() =>
    openId ? { id: openId, version: 1, draft: EMPTY_DRAFT } : readLocal(local),
  );
  const [state, setState] = useState('');
  const [isReady, setReady] = useState(!openId);
  const latest = useRef(stored);
  latest.current = stored;
  const timer = useRef<number>(0);

  useEffect(() => {
    if (!openId) return;
    void openDraft(openId)
      .then(setStored)
      .catch((problem: unknown) => setState(problem instanceof Error ? problem.message : ''))
      .finally(() => setReady(true));
  }, [openId]);

  const keepNow = useCallback(async (): Promise<string | null> => {
    window.clearTimeout(timer.current);
    const { id, version, draft } = latest.current;
    if (draft.lines.length === 0 && draft.party === '') return id;
    const clock = new Date().toTimeString().slice(0, 8);
    try {
      const kept = await send(id, version, draft);
      setStored((was) => ({ ...was, id: kept.id, version: kept.version }));
      latest.current = { ...latest.current, ...kept };
      writeLocal(local, { ...latest.current, ...kept });
      setState(`Draft kept ${clock}`);
      return kept.id;
    } catch (problem) {
      setState(
        problem instanceof Problem
          ? `Draft kept here only: ${problem.message}`
          : `Not saved. The connection dropped at ${clock}. Your ${draft.lines.length} lines are kept here.`,
      );
      return latest.current.id;
    }
  }, [local]);

  const change = useCallback(
    (part: Partial<MemoDraft>) => {
      setStored((was) => {
        const next = { ...was, draft: { ...was.draft, ...part } };
        writeLocal(local, next);
        return next;
      });
      window.clearTimeout(timer.current);
      timer.current = window.setTimeout(() => void keepNow(), KEEPS_AFTER_MS);
    },
    [keepNow, local],
  );

  const forget = useCallback(() => {
    window.clearTimeout(timer.current);
    localStorage.removeItem(local);
    setStored({ id: null, version: 1, draft: EMPTY_DRAFT });
  }, [local]);
  return { draft: stored.draft, change, state, keepNow, forget, isReady };
}

async function openDraft(openId: string): Promise<Stored> {
  const { id, version, body } = await api<{ id: string; version: number; body: MemoDraft }>(
    `/drafts/${openId}`,
  );
  return { id, version, draft: { ...EMPTY_DRAFT, ...body } };
}

async function send(
  id: string | null,
  version: number,
  draft: MemoDraft,
): Promise<{ id: string; version: number }> {
  const body = { body: draft, party: draft.party };
  if (!id) return api('/drafts', { method: 'POST', body });
  try {
    const kept = await api<{ version: number }>(`/drafts/${id}`, { method: 'PUT', version, body });
    return { id, version: kept.version };
  } catch (problem) {
    // Booked or thrown away elsewhere: what is typed here begins a new draft.
    if (problem instanceof Problem && problem.body.status === 404)
      return api('/drafts', { method: 'POST', body });
    if (problem instanceof Problem && problem.body.status === 412) {
      const { version: current } = problem.body.current as { version: number };
      return {
        id,
        version: (
          await api<{ version: number }>(`/drafts/${id}`, { method: 'PUT', version: current, body })
        ).version,
      };
    }
    throw problem;
  }
}

function readLocal(local: string): Stored {
  try {
    const kept = JSON.parse(localStorage.getItem(local) ?? 'null') as Stored | null;
    if (kept) return { ...kept, draft: { ...EMPTY_DRAFT, ...kept.draft } };
  } catch {
    // What can't be read is not a draft.
  }
  return { id: null, version: 1, draft: EMPTY_DRAFT };
}

function writeLocal(local: string, stored: Stored): void {
  localStorage.setItem(local, JSON.stringify(stored));
}
