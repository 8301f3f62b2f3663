import { formatCarats, formatPoints } from '@foldwell/quantities';
import { useQuery } from '@tanstack/react-query';
import { Link, useParams } from 'react-router-dom';

import { Loaded } from '../../../components/loading';
import { api } from '../../../lib/api-client';

interface Slip {
  number: string;
  at: string;
  snapshot: {
    memo: string;
    by: string;
    lines: {
      lot: string;
      what: string;
      sent: number;
      returned: number;
      kept: number;
      missing: number;
      out: number;
      found: number | null;
      weighing: number | null;
    }[];
    differences: { lot: string; kind: string; expected: number; found: number }[];
  };
}

/** The return slip as it was issued: what came back, what was found, what is still open. */
export function PrintSlipPage() {
  const { number = '' } = useParams();
  const query = useQuery({
    queryKey: ['document', number],
    queryFn: () => api<Slip>(`/documents/${encodeURIComponent(number)}`),
  });
  return (
    <Loaded query={query} says="Laying out the slip.">
      {({ number: slip, at, snapshot }) => (
        <div className="min-h-full bg-pad">
          <div className="acts flex gap-2 p-3">
            <Link className="btn" to={`/returns/${snapshot.memo.slice(2)}`}>
              Back to the desk
            </Link>
            <button type="button" className="btn primary" onClick={() => window.print()}>
              Print
            </button>
          </div>
          <article className="a4 mx-auto p-10">
            <h1>Return slip {slip}</h1>
            <p>
              {snapshot.memo}, weighed by {snapshot.by}, {at.slice(0, 10)}
            </p>
            <table className="inner">
              <caption>Lines</caption>
              <thead>
                <tr>
                  {[
                    'Lot',
                    'What',
                    'Sent',
                    'Back',
                    'Kept',
                    'Missing',
                    'Still out',
                    'Found',
                    'Reading',
                  ].map((head) => (
                    <th key={head}>{head}</th>
                  ))}
                </tr>
              </thead>
              <tbody>
                {snapshot.lines.map((line) => (
                  <tr key={line.lot}>
                    <td>
                      <b>{line.lot}</b>
                    </td>
                    <td>{line.what}</td>
                    {(['sent', 'returned', 'kept', 'missing', 'out'] as const).map((flow) => (
                      <td key={flow}>{formatCarats(line[flow])}</td>
                    ))}
                    <td>{line.found === null ? '–' : formatCarats(line.found)}</td>
                    <td>{line.weighing ? `W ${line.weighing}` : '–'}</td>
                  </tr>
                ))}
              </tbody>
            </table>
            <h2 className="pt-6">Not agreeing</h2>
            {snapshot.differences.length === 0 ? (
              <p>Nothing. All that came back agrees.</p>
            ) : (
              snapshot.differences.map((one) => (
                <p key={one.lot}>
                  {one.lot}: {one.kind}, expected {formatCarats(one.expected)} ct, found{' '}
                  {formatCarats(one.found)} ct, {formatPoints(one.found - one.expected)}.
                </p>
              ))
            )}
            <p className="tiny pt-6">All weights in carats.</p>
          </article>
        </div>
      )}
    </Loaded>
  );
}
