import type { PartyRow } from '@foldwell/contracts';
import { formatAmount, formatCarats } from '@foldwell/quantities';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useNavigate } from 'react-router-dom';

import { Choice, Field } from '../../../components/field';
import { LimitBar } from '../../../components/limit-bar';
import { Loaded } from '../../../components/loading';
import { useCurrentRow } from '../../../components/row-keys';
import { api } from '../../../lib/api-client';
import { useKeys } from '../../../lib/keys';
import { useMay } from '../../../lib/session';
import { AddParty } from './add-party';

const PARTS = [
  ['customer', 'Customers'],
  ['supplier', 'Suppliers'],
  ['consignor', 'Consignors'],
  ['broker', 'Brokers'],
  ['laboratory', 'Laboratories'],
  ['workshop', 'Workshops'],
] as const;

/** Whom we deal with: limit, exposure, what is out and late. */
export function PartiesPage() {
  const [part, setPart] = useState('customer');
  const [q, setQ] = useState('');
  const [isAdding, setAdding] = useState(false);
  const may = useMay('owner', 'dealer', 'buyer');
  const query = useQuery({
    queryKey: ['parties', part, q],
    queryFn: () => api<PartyRow[]>(`/parties?part=${part}&q=${encodeURIComponent(q)}`),
    placeholderData: (before) => before,
  });
  return (
    <>
      <div className="head">
        <h1>{PARTS.find(([one]) => one === part)?.[1]}</h1>
        <div className="acts items-end">
          <Choice label="Show" value={part} onValue={setPart} options={PARTS} />
          <Field label="Name or number" value={q} onValue={setQ} />
          {may && (
            <button type="button" className="btn primary" onClick={() => setAdding(true)}>
              Write one down
            </button>
          )}
        </div>
      </div>
      {isAdding && <AddParty part={part} onLeave={() => setAdding(false)} />}
      <Loaded query={query} says="Looking through the customers.">
        {(parties) => <Table parties={parties} />}
      </Loaded>
    </>
  );
}

function Table({ parties }: { parties: PartyRow[] }) {
  const navigate = useNavigate();
  const rows = useCurrentRow(parties.length);
  useKeys([
    ...rows.keys,
    {
      key: 'Enter',
      says: 'open',
      act: () => {
        const party = parties[rows.current];
        if (party) void navigate(`/customers/${party.number}`);
      },
    },
  ]);
  const most = Math.max(
    1,
    ...parties.map((party) => Math.max(party.exposure.total, party.exposure.limit ?? 0)),
  );
  if (parties.length === 0) return <p className="px-6 py-4 soft">Nobody here by that name yet.</p>;
  return (
    <div className="scroll flex-1">
      <table>
        <caption>Parties with limit and exposure</caption>
        <thead>
          <tr>
            <th scope="col">Name</th>
            <th scope="col" className="wide">
              No.
            </th>
            <th scope="col" className="wide">
              Town
            </th>
            <th scope="col" className="n">
              Memos
            </th>
            <th scope="col" className="n">
              Out <span className="unit">ct</span>
            </th>
            <th scope="col" style={{ width: 260 }} className="wide">
              Exposure against limit
            </th>
            <th scope="col" className="n">
              Exposure
            </th>
            <th scope="col" className="n wide">
              Limit
            </th>
            <th scope="col">When</th>
          </tr>
        </thead>
        <tbody ref={rows.body}>
          {parties.map((party, index) => (
            <tr
              key={party.number}
              className={`hoverable ${index === rows.current ? 'current' : ''}`}
              onClick={() => rows.setCurrent(index)}
            >
              <td className="lot">
                <Link to={`/customers/${party.number}`}>{party.name}</Link>
              </td>
              <td className="wide quiet">C {party.number}</td>
              <td className="wide soft">{party.town}</td>
              <td className="n">{party.memosOpen}</td>
              <td className="n">{formatCarats(party.out)}</td>
              <td className="wide">
                <LimitBar exposure={party.exposure} scale={most} />
              </td>
              <td className="n">
                {formatAmount(party.exposure.total, party.exposure.currency)}{' '}
                <span className="unit">{party.exposure.currency}</span>
              </td>
              <td className="n wide">
                {party.exposure.limit === null
                  ? 'none set'
                  : formatAmount(party.exposure.limit, party.exposure.currency)}
              </td>
              <td>
                {party.papers ? (
                  <span className="red">{party.papers}</span>
                ) : party.late > 0 ? (
                  <span className="red">{party.late} late</span>
                ) : (
                  <span className="quiet">{party.memosOpen > 0 ? 'in time' : 'nothing out'}</span>
                )}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
