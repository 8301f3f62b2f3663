import type { DraftLine, ReadLine } from '@foldwell/contracts';
import { formatAmount, formatCarats } from '@foldwell/quantities';
import { useQuery } from '@tanstack/react-query';
import { type Ref, useEffect, useImperativeHandle, useRef, useState } from 'react';
import { Link } from 'react-router-dom';

import { api } from '../../../lib/api-client';
import { useScanner } from '../../../lib/keys';
import { linesToBook, type MemoDraft } from './memo-draft';

export interface ScanLineHandle {
  focus(): void;
  edit(line: DraftLine): void;
  editLast(): void;
  cutLast(weight: number): void;
}

/** Lot; lot carats; lot 13p; @price; =sum. The right side says what Enter will do; a refusal leaves the line ready. */
export function ScanLine({
  draft,
  change,
  ref,
}: {
  draft: MemoDraft;
  change(part: Partial<MemoDraft>): void;
  ref: Ref<ScanLineHandle>;
}) {
  const input = useRef<HTMLInputElement>(null);
  const [note, setNote] = useState<{ read: ReadLine } | { error: string } | null>(null);
  const latest = useRef(draft);
  latest.current = draft;
  // One scan after the other: a scanner is faster than an answer.
  const queue = useRef(Promise.resolve());
  const text = draft.scan;
  const ask = (asked: string, lines: DraftLine[], signal?: AbortSignal) =>
    api<ReadLine>('/memo-lines/read', {
      method: 'POST',
      body: { text: asked, party: draft.party, lines: linesToBook(lines) },
      ...(signal && { signal }),
    });
  const preview = useQuery({
    queryKey: ['scan', text, draft.party, draft.lines.length],
    queryFn: ({ signal }) => ask(text, draft.lines, signal),
    enabled: text.trim() !== '',
    staleTime: 0,
    retry: false,
  });

  const add = (asked: string) => {
    if (asked.trim() === '') return;
    change({ scan: '' });
    queue.current = queue.current.then(async () => {
      try {
        const read = await ask(asked, latest.current.lines);
        if (read.line) {
          latest.current = { ...latest.current, lines: [...latest.current.lines, read.line] };
          change({ lines: latest.current.lines });
          setNote(read.warnings.length > 0 ? { read } : null);
        } else setNote({ read });
      } catch (problem) {
        change({ scan: asked });
        setNote({ error: problem instanceof Error ? problem.message : 'Not added.' });
      }
    });
  };
  useScanner(add);
  const edit = (line: DraftLine, weight = line.weight) => {
    const price =
      line.sum === null
        ? line.price === null
          ? ''
          : ` @${plain(line.price)}`
        : ` =${plain(line.sum)}`;
    const parts =
      line.kind === 'parcel'
        ? ` ${formatCarats(weight).replaceAll(',', '')}${line.isEstimated ? '' : ` ${line.pieces}p`}`
        : '';
    change({
      scan: `${line.lot}${parts}${price}`,
      lines: draft.lines.filter((one) => one.lot !== line.lot),
    });
    input.current?.focus();
  };
  useImperativeHandle(ref, () => ({
    focus: () => input.current?.focus(),
    edit,
    editLast: () => {
      const last = draft.lines.at(-1);
      if (last) edit(last);
    },
    cutLast: (weight) => {
      const last = draft.lines.at(-1);
      if (last) edit(last, weight);
    },
  }));
  useEffect(() => {
    input.current?.focus();
  }, []);
  const says = preview.data?.refusal?.sentence ?? preview.data?.says ?? '';
  return (
    <>
      <div className="px-6">
        <div className="field">
          <span className="sr-only">Scan line</span>
          <div className="box" style={{ height: 40, fontSize: 16 }}>
            <input
              ref={input}
              data-scans
              aria-label="Scan or type a lot"
              value={text}
              placeholder="Scan a paper, or type a lot number"
              autoComplete="off"
              spellCheck={false}
              style={{ fontWeight: 600 }}
              onChange={(event) => change({ scan: event.target.value })}
              onKeyDown={(event) => {
                if (event.key === 'Enter' && !event.ctrlKey && !event.metaKey) {
                  event.preventDefault();
                  add(text);
                }
                if (event.key === 'ArrowUp' && text === '') {
                  event.preventDefault();
                  const last = draft.lines.at(-1);
                  if (last) edit(last);
                }
              }}
            />
            <span
              className={`small ${preview.data?.refusal ? 'red' : 'soft'} max-md:hidden`}
              aria-live="polite"
            >
              {says}
            </span>
            <kbd>Enter</kbd>
          </div>
        </div>
      </div>
      <div className="flex flex-wrap gap-x-6 px-6 small soft">
        <span>
          <b>Scan</b> a paper, or type a lot number.
        </span>
        <span>
          Part of a parcel: lot, space, carats <b>4140 4.00</b>
        </span>
        <span>
          Or pieces <b>4140 13p</b>
        </span>
        <span>
          Other price <b>4140 4.00 @960</b>
        </span>
        <span>
          A sum <b>=3840</b>
        </span>
      </div>
      {note && 'error' in note && (
        <div className="note stop mx-6" role="alert">
          {note.error}
        </div>
      )}
      {note && 'read' in note && note.read.refusal && (
        <div className="note stop mx-6" role="alert">
          {note.read.refusal.sentence}{' '}
          {note.read.refusal.path && (
            <Link to={note.read.refusal.path}>{note.read.refusal.pathWords}</Link>
          )}
        </div>
      )}
      {note && 'read' in note && note.read.line && (
        <div className="note mx-6" role="status">
          {note.read.line.lot} added. {note.read.warnings.join(' ')}
        </div>
      )}
    </>
  );
}

const plain = (amount: number) => formatAmount(amount, 'USD', true).replaceAll(',', '');
