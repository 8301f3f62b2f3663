import type { PersonRow, PlaceRow } from '@foldwell/contracts';
import { formatCarats } from '@foldwell/quantities';
import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';

import { Choice, Field } from '../../../components/field';
import { Refused } from '../../../components/refused';
import { api } from '../../../lib/api-client';
import { useMay } from '../../../lib/session';

/** Drawers, shows and people who carry goods, with what lies in each. */
export function Places({ people }: { people: PersonRow[] }) {
  const isOwner = useMay('owner');
  const client = useQueryClient();
  const { data: places = [] } = useQuery({
    queryKey: ['places'],
    queryFn: () => api<PlaceRow[]>('/places'),
  });
  const [kind, setKind] = useState('drawer');
  const [safe, setSafe] = useState('A');
  const [name, setName] = useState('');
  const [error, setError] = useState<unknown>();
  const add = async () => {
    setError(undefined);
    try {
      const carrier = people.find((person) => person.id === name);
      await api('/places', {
        method: 'POST',
        body:
          kind === 'person'
            ? { kind, name: carrier?.name ?? '', person: name }
            : { kind, name, safe: kind === 'drawer' ? safe : '' },
      });
      setName('');
      await client.invalidateQueries({ queryKey: ['places'] });
    } catch (problem) {
      setError(problem);
    }
  };
  const close = (place: PlaceRow) =>
    void api(`/places/${place.id}`, { method: 'PATCH', body: { isClosed: !place.isClosed } })
      .then(() => client.invalidateQueries({ queryKey: ['places'] }))
      .catch(setError);
  const sum = places.reduce((all, place) => all + place.weight, 0);
  return (
    <section>
      <div className="section-head">
        <h2>Places</h2>
        <span className="quiet small">
          {places.filter((place) => place.kind === 'drawer').length} drawers,{' '}
          {places.filter((place) => place.kind === 'person').length} may carry goods
        </span>
      </div>
      <table>
        <caption>Places</caption>
        <thead>
          <tr>
            <th scope="col">Place</th>
            <th scope="col" className="n">
              Lots
            </th>
            <th scope="col" className="n">
              Weight <span className="unit">ct</span>
            </th>
            <th scope="col">For</th>
            <th scope="col" />
          </tr>
        </thead>
        <tbody>
          {places.map((place) => (
            <tr key={place.id}>
              <td className="lot">
                {place.words}
                {place.isClosed && <span className="quiet"> closed</span>}
              </td>
              <td className="n">{place.lots}</td>
              <td className="n">{formatCarats(place.weight)}</td>
              <td className="soft">{place.purpose}</td>
              <td>
                {isOwner && ['drawer', 'show', 'person'].includes(place.kind) && (
                  <button type="button" className="link small" onClick={() => close(place)}>
                    {place.isClosed ? 'open' : 'close'}
                  </button>
                )}
              </td>
            </tr>
          ))}
        </tbody>
        <tfoot>
          <tr>
            <td>In the house</td>
            <td className="n">{places.reduce((all, place) => all + place.lots, 0)}</td>
            <td className="n">{formatCarats(sum)}</td>
            <td colSpan={2} />
          </tr>
        </tfoot>
      </table>
      {isOwner && (
        <div className="flex flex-wrap gap-2 px-6 py-3 items-end">
          <Choice
            label="New"
            value={kind}
            onValue={setKind}
            options={[
              ['drawer', 'drawer'],
              ['show', 'show case'],
              ['person', 'person who carries'],
            ]}
            className="w-[150px]"
          />
          {kind === 'drawer' && (
            <Field label="Safe" value={safe} onValue={setSafe} className="w-[70px]" />
          )}
          {kind === 'person' ? (
            <Choice
              label="Who"
              value={name}
              onValue={setName}
              options={[
                ['', 'choose'],
                ...people.map((person) => [person.id, person.name] as const),
              ]}
              className="w-[160px]"
            />
          ) : (
            <Field label="Named" value={name} onValue={setName} className="w-[140px]" />
          )}
          <button type="button" className="btn" disabled={name === ''} onClick={() => void add()}>
            Add
          </button>
        </div>
      )}
      <div className="px-6">
        <Refused error={error} />
      </div>
      <p className="px-6 pb-2 tiny quiet">
        With carats in it, a place stays. Hand carriage: as entered; ask your insurer whether it is
        covered.
      </p>
    </section>
  );
}
