import type { LotDetail } from '@foldwell/contracts';
import {
  averageCarats,
  formatCarats,
  formatMoney,
  formatPrice,
  longDate,
  shortDate,
} from '@foldwell/quantities';

import { Barcode } from '../../../components/barcode';
import { useMe } from '../../../lib/session';

/** The folded label as it prints: the weight in that paper now, origin and treatment, no price. */
export function LotLabel({ lot }: { lot: LotDetail }) {
  const { row, particulars } = lot;
  const {
    house: { priceCurrency: currency },
  } = useMe();
  const facts: [string, React.ReactNode][] = [
    [
      'Weight',
      <>
        <b>{formatCarats(row.bar.safe)}</b> <span className="unit">ct in this paper</span>
      </>,
    ],
    ['Colour', row.colour || '–'],
    [
      'Pieces',
      <>
        <b>
          {row.isEstimated && 'about '}
          {lot.places
            .filter((place) => place.part === 'safe')
            .reduce((sum, place) => sum + place.pieces, 0)}
        </b>{' '}
        <span className="unit">pcs</span>
      </>,
    ],
    ['Clarity', row.clarity || '–'],
    row.kind === 'parcel'
      ? [
          'Average',
          <>
            {averageCarats(row.weight, row.pieces) ?? '–'} <span className="unit">ct</span>
          </>,
        ]
      : ['Report', row.report || 'no report'],
    [
      'Ask',
      row.ask === null ? (
        '–'
      ) : (
        <>
          <b>{formatPrice(row.ask, currency)}</b>
          {row.total !== null && <span className="soft">, {formatMoney(row.total, currency)}</span>}
        </>
      ),
    ],
  ];
  if (particulars.statedWeight && row.kind !== 'parcel')
    facts.push([
      'Stated',
      <>
        {formatCarats(particulars.statedWeight)} <span className="unit">ct by the report</span>
      </>,
    ]);
  if (row.kind !== 'parcel')
    facts.push([
      'Make',
      `${row.make || '–'}${row.fluorescence ? `, fluorescence ${row.fluorescence.toLowerCase()}` : ''}`,
    ]);
  return (
    <div className="px-6 pt-2">
      <div
        className="flex justify-between bg-paper-2 px-4 py-2 small soft"
        style={{ clipPath: 'polygon(0 0, 100% 0, calc(100% - 22px) 100%, 22px 100%)' }}
      >
        <span className="pl-4">
          {lot.source
            ? `Taken in ${lot.takenInOn ? shortDate(lot.takenInOn) : ''} from ${lot.source}`
            : `Opening stock ${lot.takenInOn ? longDate(lot.takenInOn) : ''}`}
        </span>
        <span className="pr-4">{lot.sourcePaper}</span>
      </div>
      <div className="paper mx-[22px] p-4 border-b-0">
        <div className="flex gap-4 items-start">
          <h1 style={{ fontSize: 40, lineHeight: '44px' }}>{row.number}</h1>
          <p className="soft grow">
            <span className="capitalize">{row.kind}</span>, {row.shape.toLowerCase() || 'no shape'}{' '}
            {row.sieve && `sieve ${row.sieve}`}
            <br />
            {row.origin}, {row.treatment || 'not treated'}
            {row.owner && (
              <>
                <br />
                owner {row.owner}
              </>
            )}
          </p>
          <Barcode text={row.number} height={38} />
        </div>
        <dl className="grid grid-cols-[64px_1fr_56px_1fr] gap-x-3 gap-y-2 pt-3">
          {facts.map(([name, value]) => (
            <div key={name} className="contents">
              <dt className="quiet">{name}</dt>
              <dd>{value}</dd>
            </div>
          ))}
        </dl>
        {row.report && <p className="tiny quiet pt-2">Grades as stated by the laboratory.</p>}
      </div>
    </div>
  );
}
