import type { LotDetail } from '@foldwell/contracts';
import { shortDate } from '@foldwell/quantities';

import { useMe } from '../../../lib/session';

/** Papers on file, reports, and where it was mined. */
export function LotPapers({ lot }: { lot: LotDetail }) {
  const {
    house: { today },
  } = useMe();
  return (
    <div className="border-l border-crease-2 min-w-0">
      <div className="section-head">
        <h2>Papers</h2>
        <span className="quiet small">{lot.papers.length} on file</span>
      </div>
      <table>
        <caption>Papers of {lot.row.number}</caption>
        <thead>
          <tr>
            <th scope="col">Paper</th>
            <th scope="col">Number</th>
            <th scope="col">Date</th>
          </tr>
        </thead>
        <tbody>
          {lot.papers.map((paper) => (
            <tr key={paper.paper + paper.number}>
              <td>{paper.paper}</td>
              <td>{paper.number}</td>
              <td>{shortDate(paper.date, today)}</td>
            </tr>
          ))}
          {(lot.particulars.reports ?? []).map((report) => (
            <tr key={report.number}>
              <td>Report, {report.standing}</td>
              <td>
                {report.laboratory} {report.number}
              </td>
              <td />
            </tr>
          ))}
        </tbody>
      </table>
      {lot.particulars.comments && (
        <p className="px-6 py-2 small">
          <b>Comments</b> {lot.particulars.comments}
        </p>
      )}
      {(lot.particulars.miningCountry || lot.particulars.miningEvidence) && (
        <p className="px-6 py-1 small soft">
          Mined in {lot.particulars.miningCountry || 'not said'}; evidence:{' '}
          {lot.particulars.miningEvidence || 'none'}.
        </p>
      )}
      {lot.particulars.miningCountry && !lot.particulars.miningEvidence && (
        <p className="note mx-6 my-1">
          Country of mining without evidence. Ask counsel whether it may be traded where it goes.
        </p>
      )}
    </div>
  );
}
