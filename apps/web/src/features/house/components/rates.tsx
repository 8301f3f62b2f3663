import type { House } from '@foldwell/contracts';
import { readDecimal } from '@foldwell/quantities';
import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';

import { Field } from '../../../components/field';
import { fieldProblem, Refused } from '../../../components/refused';
import { api } from '../../../lib/api-client';
import { useMay } from '../../../lib/session';

const RATE_DECIMALS = 8;

/** Currencies with dated rates by hand; a paper keeps the rate it was issued at. */
export function Rates({ house }: { house: House }) {
  const may = useMay('owner', 'bookkeeper');
  const client = useQueryClient();
  const [form, setForm] = useState({ currency: '', onDate: house.today, rate: '' });
  const [error, setError] = useState<unknown>();
  const [problem, setProblem] = useState<string>();
  const text = (name: keyof typeof form) => ({
    value: form[name],
    onValue: (value: string) => setForm({ ...form, [name]: value }),
    problem: fieldProblem(error, name),
  });
  const add = async () => {
    setError(undefined);
    const rate = readDecimal(form.rate, { decimals: RATE_DECIMALS, what: 'Rate' });
    setProblem(rate.kind === 'ok' ? undefined : rate.why);
    if (rate.kind !== 'ok') return;
    try {
      await api('/rates', {
        method: 'POST',
        body: {
          currency: form.currency.toUpperCase(),
          onDate: form.onDate,
          rate: rate.value / 10 ** RATE_DECIMALS,
        },
      });
      setForm({ ...form, currency: '', rate: '' });
      await client.invalidateQueries({ queryKey: ['house'] });
    } catch (problem) {
      setError(problem);
    }
  };
  return (
    <section className="border-t border-crease-2">
      <div className="section-head">
        <h2>Currencies</h2>
        <span className="quiet small">
          prices in {house.priceCurrency}, postings in {house.baseCurrency}
        </span>
      </div>
      <table>
        <caption>Dated rates</caption>
        <thead>
          <tr>
            <th scope="col">Currency</th>
            <th scope="col">From</th>
            <th scope="col" className="n">
              {house.baseCurrency} for one
            </th>
            <th scope="col">By</th>
          </tr>
        </thead>
        <tbody>
          {house.rates.map((rate) => (
            <tr key={rate.currency + rate.onDate}>
              <td className="lot">{rate.currency}</td>
              <td>{rate.onDate}</td>
              <td className="n">{Number(rate.rate)}</td>
              <td className="soft">{rate.by}</td>
            </tr>
          ))}
        </tbody>
      </table>
      {may && (
        <div className="flex flex-wrap gap-3 px-6 py-3 items-end">
          <Field label="Currency" {...text('currency')} className="w-[90px]" placeholder="EUR" />
          <Field label="From" type="date" {...text('onDate')} className="w-[150px]" />
          <Field
            label={`${house.baseCurrency} for one`}
            isNumber
            {...text('rate')}
            problem={problem ?? fieldProblem(error, 'rate')}
            className="w-[120px]"
          />
          <button type="button" className="btn" onClick={() => void add()}>
            Write down rate
          </button>
        </div>
      )}
      <div className="px-6">
        <Refused error={error} />
      </div>
    </section>
  );
}
