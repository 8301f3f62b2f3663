import type { LotDetail } from '@foldwell/contracts';
import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate, useParams } from 'react-router-dom';

import { Beam, type Part } from '../../../components/balance-bar';
import { Loaded } from '../../../components/loading';
import { api } from '../../../lib/api-client';
import { useKeys } from '../../../lib/keys';
import { useMay } from '../../../lib/session';
import { EditLot } from './edit-lot';
import { LotHistory } from './lot-history';
import { LotLabel } from './lot-label';
import { LotPapers } from './lot-papers';
import { LotPlaces } from './lot-places';
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
        <LotLabel lot={lot} />
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
        <LotPlaces lot={lot} />
        <LotPapers lot={lot} />
      </section>
      <LotHistory lot={lot} onUndo={lot.isReversible && mayEdit ? () => setOpen('undo') : null} />
    </>
  );
}

function under({ places }: LotDetail, part: Part): string {
  const own = places.filter((place) => place.part === part);
  if (own.length === 0) return '';
  const pieces = own.reduce((sum, place) => sum + place.pieces, 0);
  return `${own.length === 1 ? own[0]?.name : `${own.length} places`}, ${pieces} pcs`;
}
