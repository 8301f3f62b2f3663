import type { House, PersonRow } from '@foldwell/contracts';
import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';

import { Field, TextArea } from '../../../components/field';
import { Loaded } from '../../../components/loading';
import { NarrowNotice } from '../../../components/narrow-notice';
import { Refused } from '../../../components/refused';
import { api } from '../../../lib/api-client';
import { useKeys } from '../../../lib/keys';
import { useMay } from '../../../lib/session';
import { People } from './people';
import { Places } from './places';
import { Rates } from './rates';

/** The house: people, drawers and who may carry goods, step and tolerances, currencies, terms, number series. */
export function HousePage() {
  const house = useQuery({ queryKey: ['house'], queryFn: () => api<House>('/house') });
  const people = useQuery({ queryKey: ['people'], queryFn: () => api<PersonRow[]>('/people') });
  return (
    <Loaded query={house} says="Opening the house.">
      {(found) => (
        <>
          <div className="head">
            <h1>House</h1>
            <span className="soft">
              {found.name}, {found.town}. {found.baseCurrency}, {found.zone}, balance reads to{' '}
              {found.step === 10 ? '0.01' : '0.001'} ct
            </span>
          </div>
          <NarrowNotice what="The house’s settings" />
          <div className="grid xl:grid-cols-[minmax(0,1.3fr)_minmax(0,0.8fr)_minmax(0,1.2fr)] border-t border-crease-2 flex-1">
            <div className="min-w-0">
              <Places people={people.data ?? []} />
              <Series house={found} />
            </div>
            <Settings house={found} key={found.version} />
            <div className="min-w-0 border-l border-crease-2">
              <People people={people.data ?? []} />
              <Rates house={found} />
            </div>
          </div>
        </>
      )}
    </Loaded>
  );
}

function Series({ house }: { house: House }) {
  const isOwner = useMay('owner');
  const client = useQueryClient();
  const [error, setError] = useState<unknown>();
  const start = (series: string) => {
    const typed = window.prompt(`First number of the ${series} series`);
    if (typed)
      void api(`/number-series/${series}`, { method: 'PATCH', body: { first: Number(typed) } })
        .then(() => client.invalidateQueries({ queryKey: ['house'] }))
        .catch(setError);
  };
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
            <th scope="col" />
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
                  <button type="button" className="link small" onClick={() => start(one.series)}>
                    begin elsewhere
                  </button>
                )}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      <div className="px-6">
        <Refused error={error} />
      </div>
    </section>
  );
}

const NUMBERS = [
  ['stoneTolerance', 'Single stone, back from memo', 'pt', 10],
  ['parcelTolerance', 'Parcel, each weighing', 'pt', 10],
  ['formulaPercent', 'Weight by formula, of stated', '%', 1],
  ['acceptLimit', 'Bookkeeper accepts up to', 'pt', 10],
  ['writeOffLimit', 'Bookkeeper writes off up to', 'pt', 10],
  ['memoDays', 'Memo terms', 'd', 1],
  ['depositPercent', 'Deposit on what is kept', '%', 1],
] as const;

function Settings({ house }: { house: House }) {
  const isOwner = useMay('owner');
  const client = useQueryClient();
  const first = Object.fromEntries([
    ...NUMBERS.map(([name, , , scale]) => [name, String(house[name] / scale)]),
    ['memoText', house.memoText],
    ['warrantyText', house.warrantyText],
    ['lockDate', house.lockDate ?? ''],
  ]) as Record<string, string>;
  const [form, setForm] = useState(first);
  const [error, setError] = useState<unknown>();
  const changed = Object.keys(form).filter((name) => form[name] !== first[name]);
  const save = async () => {
    const body = Object.fromEntries(
      changed.map((name) => {
        const number = NUMBERS.find(([one]) => one === name);
        return [
          name,
          number
            ? Math.round(Number(form[name]) * number[3])
            : name === 'lockDate'
              ? form[name] || null
              : form[name],
        ];
      }),
    );
    try {
      await api('/house', { method: 'PATCH', version: house.version, body });
      await client.invalidateQueries();
    } catch (problem) {
      setError(problem);
    }
  };
  useKeys(
    [{ key: 'Ctrl Enter', says: 'keep changes', act: () => void save(), inFields: true }],
    changed.length > 0 ? `${changed.length} changes not kept` : '',
  );
  const text = (name: string) => ({
    value: form[name] ?? '',
    onValue: (value: string) => setForm({ ...form, [name]: value }),
  });
  return (
    <section className="min-w-0 border-l border-crease-2 p-6 grid gap-3 content-start">
      <h2>Tolerances and terms</h2>
      {NUMBERS.map(([name, label, unit]) => (
        <Field key={name} label={label} unit={unit} isNumber {...text(name)} readOnly={!isOwner} />
      ))}
      <Field
        label="Books locked up to"
        type="date"
        {...text('lockDate')}
        readOnly={!isOwner}
        help="Nothing is dated on or before it; a correction goes in the open month."
      />
      <TextArea
        label={`Text on the memo, version ${house.memoTextVersion}`}
        rows={5}
        {...text('memoText')}
        isReadOnly={!isOwner}
        help="Draft until your counsel approves: have counsel in your country approve title, risk, sale or return, and any filing."
      />
      <TextArea
        label="Warranty statement"
        rows={3}
        {...text('warrantyText')}
        isReadOnly={!isOwner}
        help="The house’s counsel gives the text. While it is empty no invoice of natural diamonds can be issued."
      />
      <Refused error={error} />
      {isOwner ? (
        <button
          type="button"
          className="btn primary justify-self-start"
          disabled={changed.length === 0}
          onClick={() => void save()}
        >
          Keep {changed.length} changes <kbd>Ctrl Enter</kbd>
        </button>
      ) : (
        <p className="tiny quiet">Settings, owner only. Ask an owner.</p>
      )}
    </section>
  );
}
