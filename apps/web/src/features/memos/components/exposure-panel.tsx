import type { DraftLine, MemoPreview } from '@foldwell/contracts';
import { formatCarats, formatMoney } from '@foldwell/quantities';
import { useQuery } from '@tanstack/react-query';

import { Field } from '../../../components/field';
import { LimitBar } from '../../../components/limit-bar';
import { api } from '../../../lib/api-client';
import { useMay } from '../../../lib/session';
import { linesToBook, type MemoDraft } from './memo-draft';

/** Exposure as it would be with this memo; asked again with every line. */
export function usePreview(draft: MemoDraft, due: string): MemoPreview | undefined {
  const lines = linesToBook(draft.lines);
  const { data } = useQuery<MemoPreview>({
    queryKey: ['preview', draft.party, due, JSON.stringify(lines)],
    enabled: draft.party !== '' && lines.length > 0,
    placeholderData: (before) => before,
    retry: false,
    queryFn: ({ signal }) =>
      api<MemoPreview>('/memos/preview', {
        method: 'POST',
        body: { party: draft.party, due, lines },
        signal,
      }),
  });
  return draft.party !== '' && lines.length > 0 ? data : undefined;
}

/** What is out, what this memo adds, the limit; over it, numbered answers. */
export function ExposurePanel({
  preview,
  lines,
  weight,
  onCut,
  reason,
  onReason,
}: {
  preview: MemoPreview | undefined;
  lines: DraftLine[];
  weight: number;
  onCut(weight: number): void;
  reason: string;
  onReason(reason: string): void;
}) {
  const isOwner = useMay('owner');
  if (!preview)
    return (
      <aside className="side plain">
        <h2>Exposure</h2>
        <p className="soft pt-2">It grows here as you write, once the customer is chosen.</p>
      </aside>
    );
  const { exposure, keeps } = preview;
  const money = (amount: number) => formatMoney(amount, exposure.currency);
  const isOver = preview.overBy > 0 || preview.overMemoBy > 0 || preview.lapsed !== null;
  return (
    <aside className="side plain grid gap-3 content-start" aria-live="polite">
      <h2>Exposure</h2>
      <LimitBar
        exposure={exposure}
        adds={preview.thisMemo}
        scale={Math.max(1, preview.after, (exposure.limit ?? 0) * 1.2)}
        isTall
      />
      <table className="inner">
        <tbody>
          <tr>
            <td>
              <span className="status">
                <span className="swatch out" />
                Out now, {preview.openMemos.length} memos
              </span>
            </td>
            <td className="n">{money(exposure.onMemo)}</td>
          </tr>
          <tr>
            <td>Kept, not invoiced</td>
            <td className="n">{money(exposure.kept)}</td>
          </tr>
          <tr>
            <td>
              <span className="status">
                <span className="swatch safe" />
                This memo, {lines.length} lines, {formatCarats(weight)} ct
              </span>
            </td>
            <td className="n">{money(preview.thisMemo)}</td>
          </tr>
        </tbody>
        <tfoot>
          <tr>
            <td>Exposure after booking</td>
            <td className="n">{money(preview.after)}</td>
          </tr>
        </tfoot>
      </table>
      {isOver && (
        <div className="note warn grid gap-2">
          <h3 className="red">
            {preview.lapsed ??
              (preview.overBy > 0
                ? `Over the limit by ${money(preview.overBy)}`
                : `Over the limit for one memo by ${money(preview.overMemoBy)}`)}
          </h3>
          {preview.cutLastTo !== null && (
            <button
              type="button"
              className="link text-left"
              onClick={() => onCut(preview.cutLastTo ?? 0)}
            >
              Cut the last line to {formatCarats(preview.cutLastTo)} ct, within the limit
            </button>
          )}
          {isOwner ? (
            <Field label="Why it may pass, kept with the paper" value={reason} onValue={onReason} />
          ) : (
            <p>
              Book out waits. {preview.owners.join(', ')} may release this one paper with a reason;
              the draft is kept and shown to them under Memos.
            </p>
          )}
        </div>
      )}
      {preview.cautions.map((caution) => (
        <p key={caution} className="note warn">
          {caution}
        </p>
      ))}
      <table className="inner">
        <tbody>
          <tr>
            <td className="soft">Keeps, of what we send</td>
            <td className="n">
              {keeps.sent > 0 ? `${Math.round((100 * keeps.kept) / keeps.sent)} %` : '–'}{' '}
              <span className="unit">
                of {formatCarats(keeps.sent)} ct, {keeps.memos} memos
              </span>
            </td>
          </tr>
          <tr>
            <td className="soft">Days out</td>
            <td className="n">
              {keeps.daysOut === null ? '–' : `${keeps.daysOut} d`}{' '}
              <span className="unit">on average</span>
            </td>
          </tr>
          <tr>
            <td className="soft">Differences</td>
            <td className="n">
              {keeps.differences === 0 ? 'none' : keeps.differences}{' '}
              <span className="unit">in {keeps.memos} memos</span>
            </td>
          </tr>
        </tbody>
      </table>
    </aside>
  );
}
