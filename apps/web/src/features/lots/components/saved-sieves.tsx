import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';

import { Field } from '../../../components/field';
import { api } from '../../../lib/api-client';

interface Saved {
  id: string;
  name: string;
  sieve: string;
}

/** Sieves saved by name; the open one can be saved too. */
export function SavedSieves({ sieve, onOpen }: { sieve: string; onOpen(sieve: string): void }) {
  const client = useQueryClient();
  const { data = [] } = useQuery({ queryKey: ['sieves'], queryFn: () => api<Saved[]>('/sieves') });
  const [name, setName] = useState('');
  const changed = () => client.invalidateQueries({ queryKey: ['sieves'] });
  const save = async () => {
    await api('/sieves', { method: 'POST', body: { name, sieve } });
    setName('');
    await changed();
  };
  return (
    <details className="relative max-md:hidden">
      <summary className="btn">Saved sieves</summary>
      <div className="absolute right-0 z-10 bg-paper border border-edge p-3 grid gap-2 w-[260px]">
        {data.length === 0 && <p className="quiet small">None saved yet.</p>}
        {data.map((one) => (
          <div key={one.id} className="flex gap-2">
            <button type="button" className="link grow text-left" onClick={() => onOpen(one.sieve)}>
              {one.name}
            </button>
            <button
              type="button"
              className="link"
              onClick={() => void api(`/sieves/${one.id}`, { method: 'DELETE' }).then(changed)}
            >
              drop
            </button>
          </div>
        ))}
        <Field label="Save this one as" value={name} onValue={setName} />
        <button
          type="button"
          className="btn"
          disabled={name.trim() === ''}
          onClick={() => void save()}
        >
          Save sieve
        </button>
      </div>
    </details>
  );
}
