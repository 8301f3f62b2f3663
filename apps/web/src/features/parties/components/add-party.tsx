import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';

import { Field } from '../../../components/field';
import { fieldProblem, Refused } from '../../../components/refused';
import { api } from '../../../lib/api-client';
import { useKept } from '../../../lib/kept';

const EMPTY = {
  name: '',
  town: '',
  email: '',
  contact: '',
  phone: '',
  taxNumber: '',
  currency: '',
};

/** A new party; what it is to us follows the list it is written into. */
export function AddParty({ part, onLeave }: { part: string; onLeave(): void }) {
  const [form, change, forget] = useKept(`new ${part}`, EMPTY);
  const [error, setError] = useState<unknown>();
  const navigate = useNavigate();
  const client = useQueryClient();
  const text = (name: keyof typeof EMPTY) => ({
    value: form[name],
    onValue: (value: string) => change({ [name]: value }),
    problem: fieldProblem(error, name),
  });
  const add = async () => {
    const { currency, ...given } = form;
    try {
      const { number } = await api<{ number: string }>('/parties', {
        method: 'POST',
        body: {
          ...given,
          ...(currency && { currency: currency.toUpperCase() }),
          [`is${part[0]?.toUpperCase()}${part.slice(1)}`]: true,
        },
      });
      forget();
      await client.invalidateQueries({ queryKey: ['parties'] });
      void navigate(`/customers/${number}`);
    } catch (problem) {
      setError(problem);
    }
  };
  return (
    <section
      className="bg-tissue px-6 py-4 grid gap-3 border-y border-crease-2"
      aria-label={`New ${part}`}
    >
      <h2>New {part}</h2>
      <div className="grid grid-cols-2 md:grid-cols-4 gap-3">
        <Field label="Name" {...text('name')} autoFocus />
        <Field label="Town" {...text('town')} />
        <Field label="Contact" {...text('contact')} />
        <Field label="E-mail" {...text('email')} />
        <Field label="Telephone" {...text('phone')} />
        <Field label="Tax number" {...text('taxNumber')} />
        <Field label="Currency, the house’s without" {...text('currency')} />
      </div>
      <Refused error={error} />
      <div className="flex gap-2">
        <button type="button" className="btn primary" onClick={() => void add()}>
          Write down
        </button>
        <button type="button" className="btn" onClick={onLeave}>
          Leave
        </button>
      </div>
    </section>
  );
}
