import { formatAmount, formatCarats, formatPoints, longDate } from '@foldwell/quantities';
import { useQuery } from '@tanstack/react-query';
import { Link, useParams } from 'react-router-dom';

import { Barcode } from '../../../components/barcode';
import { Loaded } from '../../../components/loading';
import { api } from '../../../lib/api-client';

interface Paper {
  number: string;
  hash: string;
  snapshot: {
    house?: { name: string; town: string };
    party: { number: string; name: string; town?: string; address?: string };
    date?: string;
    due: string;
    currency?: string;
    handedTo?: string;
    carriedBy?: string;
    by?: string;
    text?: string;
    tolerance?: number;
    from?: string;
    reason?: string;
    lines: {
      position: number;
      lot: string;
      what: string;
      origin?: string;
      grades?: string;
      pieces: number;
      isEstimated?: boolean;
      weight: number;
      pricedWeight?: number;
      price: number | null;
      sum: number | null;
      amount?: number;
    }[];
  };
}

/** The paper that goes with the goods, from what was kept when it was issued; A4 in thirds, black and white. */
export function PrintMemoPage() {
  const { number = '' } = useParams();
  const query = useQuery({
    queryKey: ['document', number],
    queryFn: () => api<Paper>(`/documents/${encodeURIComponent(`M ${number}`)}`),
  });
  return (
    <Loaded query={query} says={`Laying out M ${number}.`}>
      {(paper) => <Sheet paper={paper} memo={number} />}
    </Loaded>
  );
}

function Sheet({ paper: { number, hash, snapshot: paper }, memo }: { paper: Paper; memo: string }) {
  const currency = paper.currency ?? 'USD';
  const total = paper.lines.reduce((sum, line) => sum + (line.amount ?? 0), 0);
  const weight = paper.lines.reduce((sum, line) => sum + line.weight, 0);
  return (
    <div className="min-h-full bg-pad">
      <div className="acts flex gap-2 p-3">
        <Link className="btn" to={`/memos/${memo}`}>
          Back to M {memo}
        </Link>
        <button type="button" className="btn primary" onClick={() => window.print()}>
          Print
        </button>
      </div>
      <article className="a4 mx-auto p-10">
        <header className="flex justify-between items-start pb-6 border-b border-black">
          <div>
            <h1>{paper.house?.name ?? 'Memo'}</h1>
            <p>{paper.house?.town}</p>
          </div>
          <div className="text-right">
            <h2>Memo {number}</h2>
            <p>{paper.date && longDate(paper.date)}</p>
            <Barcode text={number.replace(' ', '')} />
          </div>
        </header>
        <section className="grid grid-cols-2 py-4">
          <div>
            <p className="tiny">To</p>
            <p>
              <b>{paper.party.name}</b>, C {paper.party.number}
            </p>
            <p>{paper.party.address || paper.party.town}</p>
          </div>
          <div>
            <p>
              Due back <b>{longDate(paper.due)}</b>
            </p>
            <p>
              Handed to {paper.handedTo || '…'}, carried by {paper.carriedBy || '…'}
            </p>
            {paper.from && <p>Transferred from {paper.from}</p>}
          </div>
        </section>
        <table className="inner">
          <caption>Lines</caption>
          <thead>
            <tr>
              <th>Lot</th>
              <th>What</th>
              <th className="n">Pcs</th>
              <th className="n">ct</th>
              <th className="n">{currency}/ct</th>
              <th className="n">{currency}</th>
              <th>Kept</th>
              <th>Back</th>
            </tr>
          </thead>
          <tbody>
            {paper.lines.map((line) => (
              <tr key={line.lot}>
                <td>
                  <b>{line.lot}</b>
                </td>
                <td className="whitespace-normal">
                  {line.what}
                  <br />
                  <span className="tiny">
                    {line.origin}; {line.grades}
                  </span>
                </td>
                <td className="n">
                  {line.isEstimated && 'about '}
                  {line.pieces}
                </td>
                <td className="n">
                  {formatCarats(line.weight)}
                  {line.pricedWeight && line.pricedWeight !== line.weight ? (
                    <span className="tiny">
                      <br />
                      priced {formatCarats(line.pricedWeight)}
                    </span>
                  ) : null}
                </td>
                <td className="n">
                  {line.price === null ? 'sum' : formatAmount(line.price, currency, true)}
                </td>
                <td className="n">
                  {line.amount === undefined ? '' : formatAmount(line.amount, currency)}
                </td>
                <td style={{ width: 60, borderLeft: '1px solid #999' }} />
                <td style={{ width: 60, borderLeft: '1px solid #999' }} />
              </tr>
            ))}
          </tbody>
          <tfoot>
            <tr>
              <td colSpan={3}>{paper.lines.length} lots</td>
              <td className="n">{formatCarats(weight)}</td>
              <td />
              <td className="n">{total ? formatAmount(total, currency) : ''}</td>
              <td colSpan={2} />
            </tr>
          </tfoot>
        </table>
        <section className="pt-6 small grid gap-2">
          <p>{paper.text}</p>
          {paper.tolerance !== undefined && (
            <p>
              Parcels are weighed back; a difference over{' '}
              {formatPoints(paper.tolerance).replace('+', '')} is asked about before the memo
              closes.
            </p>
          )}
          <p className="tiny">
            Draft terms: have counsel in your country approve title, risk, sale or return, and any
            filing. Insurance: ask your insurer whether memo, hand carriage and this address are
            covered.
          </p>
        </section>
        <section className="grid grid-cols-3 gap-6 pt-16 tiny">
          <p className="border-t border-black pt-1">Handed over, {paper.by}</p>
          <p className="border-t border-black pt-1">Counted and weighed by both</p>
          <p className="border-t border-black pt-1">Received, {paper.handedTo}</p>
        </section>
        <p className="tiny pt-6">Kept as issued, SHA-256 {hash.slice(0, 16)}…</p>
      </article>
    </div>
  );
}
