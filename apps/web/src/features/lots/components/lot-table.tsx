import type { LotDetail, LotRow } from '@foldwell/contracts';
import { averageCarats, formatAmount, formatCarats } from '@foldwell/quantities';
import { useQuery } from '@tanstack/react-query';
import { useVirtualizer } from '@tanstack/react-virtual';
import { Fragment, useRef } from 'react';
import { Link } from 'react-router-dom';

import { BalanceBar, Swatch } from '../../../components/balance-bar';
import type { useCurrentRow } from '../../../components/row-keys';
import { api } from '../../../lib/api-client';
import { useMe } from '../../../lib/session';

interface Props {
  rows: LotRow[];
  table: ReturnType<typeof useCurrentRow>;
  picked: ReadonlyMap<string, LotRow>;
  onPick(row: LotRow): void;
  unfolded: string | null;
  sort: string;
  onSort(sort: string): void;
  hasMore: boolean;
  isMore: boolean;
  onMore(): void;
}

const VIRTUAL_PAST = 200;
const ROW = 28;

/** The lot table: sorted at the head, unfolded in place, drawn only where it is seen past 200 rows. */
export function LotTable(props: Props) {
  const { rows, hasMore, isMore, onMore } = props;
  const {
    house: { priceCurrency: currency },
  } = useMe();
  const scroll = useRef<HTMLDivElement>(null);
  const isVirtual = rows.length > VIRTUAL_PAST;
  const virtual = useVirtualizer({
    count: rows.length,
    getScrollElement: () => scroll.current,
    estimateSize: () => ROW,
    overscan: 20,
    enabled: isVirtual,
  });
  const shown = isVirtual
    ? virtual.getVirtualItems().map((one) => one.index)
    : rows.map((_, index) => index);
  const before = isVirtual ? (virtual.getVirtualItems()[0]?.start ?? 0) : 0;
  const after = isVirtual
    ? virtual.getTotalSize() - (virtual.getVirtualItems().at(-1)?.end ?? 0)
    : 0;
  return (
    <div className="scroll flex-1" ref={scroll}>
      <table>
        <caption>Lots that pass the sieve</caption>
        <thead>
          <tr>
            <th scope="col">
              <span className="sr-only">Selected</span>
            </th>
            <Sorted name="number" {...props}>
              Lot
            </Sorted>
            <th scope="col" className="wide fold-first">
              Kind
            </th>
            <Sorted name="shape" {...props}>
              Shape or sieve
            </Sorted>
            <Sorted name="pieces" isNumber {...props}>
              Pcs
            </Sorted>
            <Sorted name="weight" isNumber unit="ct" {...props}>
              Weight
            </Sorted>
            <Sorted name="colour" {...props}>
              Colour
            </Sorted>
            <Sorted name="clarity" {...props}>
              Clarity
            </Sorted>
            <th scope="col" className="wide fold-first">
              Cut pol sym
            </th>
            <th scope="col" className="wide fold-first">
              Fluor.
            </th>
            <Sorted name="report" isWide {...props}>
              Report
            </Sorted>
            <Sorted name="ask" isNumber unit={`${currency}/ct`} {...props}>
              Ask
            </Sorted>
            <th scope="col" className="n wide">
              Total <span className="unit">{currency}</span>
            </th>
            <th scope="col" style={{ width: 170 }}>
              Balance
            </th>
            <th scope="col">Place</th>
          </tr>
        </thead>
        <tbody ref={props.table.body}>
          {before > 0 && (
            <tr>
              <td colSpan={15} style={{ height: before, padding: 0 }} />
            </tr>
          )}
          {shown.map(
            (index) =>
              rows[index] && (
                <Row key={rows[index].number} row={rows[index]} index={index} {...props} />
              ),
          )}
          {after > 0 && (
            <tr>
              <td colSpan={15} style={{ height: after, padding: 0 }} />
            </tr>
          )}
        </tbody>
      </table>
      {hasMore && (
        <p className="p-3 px-6">
          <button type="button" className="btn" onClick={onMore} disabled={isMore}>
            {isMore ? 'Reading the next hundred.' : 'Next hundred'}
          </button>
        </p>
      )}
    </div>
  );
}

function Sorted({
  name,
  children,
  unit,
  isNumber,
  isWide,
  sort,
  onSort,
}: Props & {
  name: string;
  children: string;
  unit?: string;
  isNumber?: boolean;
  isWide?: boolean;
}) {
  const way = sort === name ? 'ascending' : sort === `-${name}` ? 'descending' : 'none';
  return (
    <th scope="col" className={`${isNumber ? 'n' : ''} ${isWide ? 'wide' : ''}`} aria-sort={way}>
      <button type="button" onClick={() => onSort(way === 'ascending' ? `-${name}` : name)}>
        {children}
        {way === 'ascending' ? ' ↑' : way === 'descending' ? ' ↓' : ''}
      </button>
      {unit && <span className="unit">{unit}</span>}
    </th>
  );
}

function Row({
  row,
  index,
  table,
  picked,
  onPick,
  unfolded,
}: Props & { row: LotRow; index: number }) {
  const {
    house: { priceCurrency: currency },
  } = useMe();
  const isPicked = picked.has(row.number);
  return (
    <Fragment>
      <tr
        className={`hoverable ${index === table.current ? 'current' : ''}`}
        aria-selected={isPicked}
        onClick={() => table.setCurrent(index)}
      >
        <td>
          <input
            type="checkbox"
            aria-label={`Select ${row.number}`}
            checked={isPicked}
            onChange={() => onPick(row)}
          />
        </td>
        <td className="lot">
          <Link to={`/lots/${row.number}`}>{row.number}</Link>
        </td>
        <td className="wide fold-first soft capitalize">{row.kind}</td>
        <td>
          {row.shape} {row.sieve}
        </td>
        <td className="n">
          {row.isEstimated && <span className="quiet">about </span>}
          {row.pieces.toLocaleString('en-US')}
        </td>
        <td className="n">
          <b>{formatCarats(row.weight)}</b>
        </td>
        <td>{row.colour}</td>
        <td>{row.clarity}</td>
        <td className="wide fold-first">
          {row.kind === 'parcel' ? (
            <span className="quiet">average {averageCarats(row.weight, row.pieces)} ct</span>
          ) : (
            row.make
          )}
        </td>
        <td className="wide fold-first">{row.fluorescence}</td>
        <td className="wide">
          {row.report || (row.kind === 'parcel' ? '' : <span className="quiet">no report</span>)}
        </td>
        <td className="n">{row.ask === null ? '–' : formatAmount(row.ask, currency, true)}</td>
        <td className="n wide">{row.total === null ? '–' : formatAmount(row.total, currency)}</td>
        <td>
          <BalanceBar parts={row.bar} whole={row.weight} />
        </td>
        <td className={row.tone === 'plain' ? 'soft' : 'red'}>
          {row.owner && <span className="quiet">{row.owner}: </span>}
          {row.place}
        </td>
      </tr>
      {unfolded === row.number && (
        <tr className="unfolded">
          <td colSpan={15}>
            <Unfolded number={row.number} />
          </td>
        </tr>
      )}
    </Fragment>
  );
}

/** A lot unfolded: one line for each place that holds some of it. */
function Unfolded({ number }: { number: string }) {
  const { data } = useQuery({
    queryKey: ['lot', number],
    queryFn: () => api<LotDetail>(`/lots/${number}`),
  });
  if (!data)
    return (
      <p className="px-6 py-2 soft" role="status">
        Unfolding {number}.
      </p>
    );
  return (
    <div className="unfold px-10 py-2">
      <table className="inner">
        <caption>Places of {number}</caption>
        <tbody>
          {data.places.map((place) => (
            <tr key={place.placeId}>
              <td>
                <span className="status">
                  <Swatch part={place.part} />
                  {place.name}
                </span>
              </td>
              <td className={`n ${place.part === 'missing' ? 'red' : ''}`}>
                {formatCarats(place.weight)} <span className="unit">ct</span>
              </td>
              <td className="n">
                {place.pieces} <span className="unit">pcs</span>
              </td>
              <td className="soft">{place.due ? `due ${place.due}` : `since ${place.since}`}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
