import type { House } from '@foldwell/contracts';
import { readDecimal } from '@foldwell/quantities';
import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';

import { Field } from '../../../components/field';
import { fieldProblem, Refused } from '../../../components/refused';
import { api } from '../../../lib/api-client';
import { useMay } from '../../../lib/session';

type One = House['series'][number];

/** Number series: without gaps; one that was never used may begin elsewhere. */
export function Series({ house }: { house: House }) {
  const isOwner = useMay('owner');
  const [begins, setBegins] = useState<string | null>(null);
  return (
    <section className="border-t border-crease-2">
      <div className="section-head">
        <h2>Number series</h2>
        <span className="quiet small">no gaps, never used twice</span>
      </div>
      <table>
        <caption>Number series</caption>
        <thead>
          <tr>
            <th scope="col">Paper</th>
            <th scope="col">Mark</th>
            <th scope="col" className="n">
              Last used
            </th>
            <th scope="col" className="n">
              Next
            </th>
            <th scope="col">Gaps</th>
            <th scope="col">
              <span className="sr-only">Begin elsewhere</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {house.series.map((one) => (
            <tr key={one.series}>
              <td className="capitalize">{one.series}</td>
              <td>
                <b>{one.mark || '–'}</b>
              </td>
              <td className="n">{one.lastUsed ?? '–'}</td>
              <td className="n">
                {one.mark} {one.next}
              </td>
              <td>{one.gaps === 0 ? 'none' : <span className="red">{one.gaps}</span>}</td>
              <td>
                {isOwner && one.lastUsed === null && (
                  <button
                    type="button"
                    className="link small"
                    aria-label={`Begin the ${one.series} series elsewhere`}
                    onClick={() => setBegins(one.series)}
                  >
                    begin elsewhere
                  </button>
                )}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      {begins && <Begin key={begins} series={begins} onDone={() => setBegins(null)} />}
    </section>
  );
}

function Begin({ series, onDone }: { series: One['series']; onDone(): void }) {
  const client = useQueryClient();
  const [first, setFirst] = useState('');
  const [problem, setProblem] = useState<string>();
  const [error, setError] = useState<unknown>();
  const begin = async () => {
    const reading = readDecimal(first, { decimals: 0, what: 'First number' });
    setProblem(reading.kind === 'ok' ? undefined : reading.why);
    if (reading.kind !== 'ok') return;
    try {
      const body = { first: reading.value };
      await api(`/number-series/${series}`, { method: 'PATCH', body });
      await client.invalidateQueries({ queryKey: ['house'] });
      onDone();
    } catch (refusal) {
      setError(refusal);
    }
  };
  return (
    <form
      className="unfold bg-tissue px-6 py-3 flex flex-wrap gap-2 items-end"
      onSubmit={(event) => {
        event.preventDefault();
        void begin();
      }}
    >
      <Field
        label={`First number of the ${series} series`}
        isNumber
        value={first}
        onValue={setFirst}
        problem={problem ?? fieldProblem(error, 'first')}
        autoFocus
      />
      <button type="submit" className="btn">
        Begin there
      </button>
      <button type="button" className="btn" onClick={onDone}>
        Leave
      </button>
      <Refused error={error} />
    </form>
  );
}
