import type { LotDetail } from '@foldwell/contracts';
import {
  averageCarats,
  dueWords,
  formatAmount,
  formatCarats,
  formatMoney,
  formatPrice,
  longDate,
  shortDate,
} from '@foldwell/quantities';
import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useNavigate, useParams } from 'react-router-dom';

import { BalanceBar, Beam, type Part, Swatch } from '../../../components/balance-bar';
import { Barcode } from '../../../components/barcode';
import { Loaded } from '../../../components/loading';
import { api } from '../../../lib/api-client';
import { useKeys } from '../../../lib/keys';
import { useMay, useMe } from '../../../lib/session';
import { EditLot } from './edit-lot';
import { MoveLot } from './move-lot';
import { UndoMovement } from './undo-movement';

const LEGEND: [Part, string][] = [
  ['safe', 'Safe'],
  ['out', 'On memo'],
  ['returned', 'Returned'],
  ['sold', 'Sold'],
  ['missing', 'Missing'],
];

/** One lot: its paper, where every carat of it is, its papers on file, its history. */
export function LotPage() {
  const { number = '' } = useParams();
  const query = useQuery({
    queryKey: ['lot', number],
    queryFn: () => api<LotDetail>(`/lots/${number}`),
  });
  return (
    <Loaded query={query} says={`Unfolding ${number}.`}>
      {(lot) => <Lot lot={lot} key={number} />}
    </Loaded>
  );
}

function Lot({ lot }: { lot: LotDetail }) {
  const { row } = lot;
  const navigate = useNavigate();
  const client = useQueryClient();
  const mayWrite = useMay('owner', 'dealer');
  const mayEdit = useMay('owner', 'dealer', 'buyer');
  const [open, setOpen] = useState<'edit' | 'move' | 'undo' | null>(null);
  const changed = () => {
    setOpen(null);
    void client.invalidateQueries();
  };
  const toMemo = () => void navigate(`/memos/new?lots=${row.number}`);
  useKeys([
    ...(mayWrite ? [{ key: 'N', says: 'put on a memo', act: toMemo }] : []),
    { key: 'V', says: 'move', act: () => setOpen('move') },
    ...(mayEdit ? [{ key: 'E', says: 'edit', act: () => setOpen('edit') }] : []),
    { key: 'P', says: 'print label', act: () => window.print() },
    {
      key: '[',
      says: 'previous',
      act: () => lot.previous && void navigate(`/lots/${lot.previous}`),
    },
    { key: ']', says: 'next lot', act: () => lot.next && void navigate(`/lots/${lot.next}`) },
    { key: 'Esc', says: 'back to lots', act: () => void navigate('/lots') },
  ]);
  return (
    <>
      <section className="grid lg:grid-cols-[520px_minmax(0,1fr)] bg-tissue border-b border-crease-2">
        <Label lot={lot} />
        <div className="py-3 min-w-0">
          <div className="flex flex-wrap gap-2 items-center px-[29px]">
            <h2 className="grow">Where every carat is</h2>
            <button type="button" className="btn" onClick={() => setOpen('move')}>
              Move <kbd>V</kbd>
            </button>
            {mayEdit && (
              <button type="button" className="btn" onClick={() => setOpen('edit')}>
                Edit <kbd>E</kbd>
              </button>
            )}
            {mayWrite && (
              <button type="button" className="btn primary" onClick={toMemo}>
                Put on a memo <kbd>N</kbd>
              </button>
            )}
          </div>
          <Beam
            parts={row.bar}
            whole={row.weight}
            legend={[
              ...LEGEND.map(([part, name]) => ({
                part,
                name,
                weight: row.bar[part],
                under: under(lot, part),
                isRed: part === 'missing' && row.bar.missing > 0,
              })),
              {
                name: '= Whole',
                weight: row.weight,
                under: `${row.isEstimated ? 'about ' : ''}${row.pieces} pcs`,
              },
            ]}
          />
        </div>
      </section>
      {lot.warnings.length > 0 && (
        <div className="note mx-6 mt-3">
          <b>Look again.</b> {lot.warnings.join(' ')} It never blocks.
        </div>
      )}
      {open === 'edit' && <EditLot lot={lot} onDone={changed} onLeave={() => setOpen(null)} />}
      {open === 'move' && <MoveLot lot={lot} onDone={changed} onLeave={() => setOpen(null)} />}
      {open === 'undo' && lot.isReversible && (
        <UndoMovement movement={lot.isReversible} onDone={changed} onLeave={() => setOpen(null)} />
      )}
      <section className="grid xl:grid-cols-[minmax(0,1fr)_420px]">
        <Places lot={lot} />
        <Papers lot={lot} />
      </section>
      <History lot={lot} onUndo={lot.isReversible && mayEdit ? () => setOpen('undo') : null} />
    </>
  );
}

function under({ places }: LotDetail, part: Part): string {
  const own = places.filter((place) => place.part === part);
  if (own.length === 0) return '';
  const pieces = own.reduce((sum, place) => sum + place.pieces, 0);
  return `${own.length === 1 ? own[0]?.name : `${own.length} places`}, ${pieces} pcs`;
}

/** The folded label as it prints: the weight in that paper now, origin and treatment, no price. */
function Label({ lot }: { lot: LotDetail }) {
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

function Places({ lot }: { lot: LotDetail }) {
  const {
    house: { priceCurrency: base, today },
  } = useMe();
  const seesCost = lot.places.some((place) => place.cost !== undefined);
  const open = lot.places.find((place) => place.differenceId);
  return (
    <div className="min-w-0 overflow-x-auto">
      <div className="section-head">
        <h2>Places</h2>
        <span className="quiet small">one line for each place, adds to the whole</span>
        {open && <span className="red small ml-auto">a difference waits for an answer</span>}
      </div>
      <table>
        <caption>Places of {lot.row.number}</caption>
        <thead>
          <tr>
            <th scope="col">Place or holder</th>
            <th scope="col">Paper</th>
            <th scope="col">Since</th>
            <th scope="col">Due</th>
            <th scope="col" className="n">
              Pcs
            </th>
            <th scope="col" className="n">
              Weight <span className="unit">ct</span>
            </th>
            <th scope="col" className="n">
              Price <span className="unit">per ct</span>
            </th>
            <th scope="col" className="n">
              Value
            </th>
            {seesCost && (
              <th scope="col" className="n">
                Cost <span className="unit">{base}</span>
              </th>
            )}
          </tr>
        </thead>
        <tbody>
          {lot.places.map((place) => {
            const currency = place.currency ?? base;
            return (
              <tr
                key={place.placeId}
                className={place.part === 'missing' || place.differenceId ? 'differs' : ''}
              >
                <td>
                  <span className="status">
                    <Swatch part={place.part} />
                    {place.part === 'missing' ? (
                      <span className="red">Difference open</span>
                    ) : (
                      place.name
                    )}
                  </span>
                </td>
                <td>
                  {place.paper ? (
                    <Link to={`/memos/${place.paper.slice(2)}`}>{place.paper}</Link>
                  ) : (
                    '–'
                  )}
                </td>
                <td>{shortDate(place.since, today)}</td>
                <td className={place.due && place.due < today ? 'red' : ''}>
                  {place.due
                    ? `${shortDate(place.due, today)}, ${dueWords(place.due, today)}`
                    : '–'}
                </td>
                <td className="n">{place.pieces}</td>
                <td className="n">{formatCarats(place.weight)}</td>
                <td className="n">
                  {place.price === null ? '–' : formatAmount(place.price, currency, true)}
                </td>
                <td className="n">
                  {place.value === null ? (
                    '–'
                  ) : (
                    <>
                      {formatAmount(place.value, currency)} <span className="unit">{currency}</span>
                    </>
                  )}
                </td>
                {seesCost && <td className="n">{formatAmount(place.cost ?? 0, base)}</td>}
              </tr>
            );
          })}
        </tbody>
        <tfoot>
          <tr>
            <td>Whole</td>
            <td colSpan={3} />
            <td className="n">{lot.row.pieces}</td>
            <td className="n">{formatCarats(lot.row.weight)}</td>
            <td />
            <td />
            {seesCost && (
              <td className="n">
                {formatAmount(
                  lot.places.reduce((sum, place) => sum + (place.cost ?? 0), 0),
                  base,
                )}
              </td>
            )}
          </tr>
        </tfoot>
      </table>
    </div>
  );
}

function Papers({ lot }: { lot: LotDetail }) {
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

function History({ lot, onUndo }: { lot: LotDetail; onUndo: (() => void) | null }) {
  const {
    house: { today },
  } = useMe();
  return (
    <section className="border-t border-crease-2 overflow-x-auto">
      <div className="section-head">
        <h2>History</h2>
        <span className="quiet small">
          the balance after each entry; entries are never changed, only answered by a later one
        </span>
        {onUndo && (
          <button type="button" className="link small ml-auto" onClick={onUndo}>
            Undo the last booking
          </button>
        )}
      </div>
      <table>
        <caption>History of {lot.row.number}</caption>
        <thead>
          <tr>
            <th scope="col">When</th>
            <th scope="col">Who</th>
            <th scope="col">What</th>
            <th scope="col" className="n">
              Moved <span className="unit">ct</span>
            </th>
            <th scope="col">To</th>
            <th scope="col" style={{ width: 320 }}>
              Balance after
            </th>
            <th scope="col" className="n">
              Whole <span className="unit">ct</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {lot.history.map((entry, index) => {
            const whole = Object.values(entry.after).reduce((sum, part) => sum + part, 0);
            return (
              <tr key={`${entry.at}${index}`}>
                <td title={longDate(entry.date)}>{shortDate(entry.date, today)}</td>
                <td className="soft">{entry.who}</td>
                <td>{entry.what}</td>
                <td className="n">{formatCarats(entry.moved)}</td>
                <td>
                  {entry.to && (
                    <span className="status">
                      <Swatch part={entry.to} />
                      {LEGEND.find(([part]) => part === entry.to)?.[1]}
                    </span>
                  )}
                </td>
                <td>
                  <BalanceBar parts={entry.after} />
                </td>
                <td className="n">{formatCarats(whole)}</td>
              </tr>
            );
          })}
        </tbody>
      </table>
    </section>
  );
}
