import type { MemoDetail } from '@foldwell/contracts';
import { formatCarats, shortDate } from '@foldwell/quantities';
import { Link } from 'react-router-dom';

/** Papers on file and the terms it was sent on. */
export function MemoPapers({ memo }: { memo: MemoDetail }) {
  return (
    <div className="border-l border-crease-2 min-w-0">
      <div className="section-head">
        <h2>Papers</h2>
        <span className="quiet small">{memo.papers.length} on file</span>
      </div>
      <table>
        <caption>Papers of M {memo.number}</caption>
        <tbody>
          {memo.papers.map((paper) => (
            <tr key={paper.kind + paper.number}>
              <td>{paper.kind}</td>
              <td>
                {paper.kind === 'Memo' ? (
                  <Link to={`/print/memos/${memo.number}`}>{paper.number}</Link>
                ) : (
                  paper.number
                )}
              </td>
              <td>{shortDate(paper.date)}</td>
            </tr>
          ))}
        </tbody>
      </table>
      <div className="section-head">
        <h2>Terms of this memo</h2>
      </div>
      <table>
        <caption>Terms</caption>
        <tbody>
          <tr>
            <td className="soft">Title</td>
            <td className="n">ours until invoiced</td>
          </tr>
          <tr>
            <td className="soft">Risk</td>
            <td className="n">as the terms say</td>
          </tr>
          <tr>
            <td className="soft">Handed to</td>
            <td className="n">
              {memo.handedTo || '–'}, {memo.carriedBy || '–'}
            </td>
          </tr>
          <tr>
            <td className="soft">Tolerance</td>
            <td className="n">
              stone {formatCarats(memo.stoneTolerance)}, parcel {formatCarats(memo.parcelTolerance)}{' '}
              <span className="unit">ct</span>
            </td>
          </tr>
          {memo.otherMemos.map((other) => (
            <tr key={other.number}>
              <td className="soft">Their other memo</td>
              <td className="n">
                <Link to={`/memos/${other.number}`}>M {other.number}</Link>,{' '}
                {formatCarats(other.out)} <span className="unit">ct</span>
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
