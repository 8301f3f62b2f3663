import type { MemoPreview } from '@foldwell/contracts';

import type { MemoDraft } from './memo-draft';

interface Readiness {
  /** Over a limit, or papers lapsed: it waits for an owner. */
  isOver: boolean;
  /** Why it can't be booked yet; null where it can. */
  cannot: string | null;
}

/** Whether a draft can be booked by this person now, and if not why. */
export function readiness(
  draft: MemoDraft,
  preview: MemoPreview | undefined,
  { isOwner, reason }: { isOwner: boolean; reason: string },
): Readiness {
  const isOver = preview
    ? preview.overBy > 0 || preview.overMemoBy > 0 || preview.lapsed !== null
    : false;
  return { isOver, cannot: missing(draft) ?? (isOver ? waits(preview, isOwner, reason) : null) };
}

function missing({ party, lines }: MemoDraft): string | null {
  if (party === '') return 'Choose the customer first.';
  if (lines.length === 0) return 'Add a line first.';
  const isPriced = lines.every((line) => line.price !== null || line.sum !== null);
  return isPriced ? null : 'A line has no price yet; type its lot with @ and the price.';
}

function waits(preview: MemoPreview | undefined, isOwner: boolean, reason: string): string | null {
  if (!isOwner) return `Book out waits for ${preview?.owners[0] ?? 'an owner'}.`;
  return reason.trim() === '' ? 'Write why it may pass; that is your release.' : null;
}
