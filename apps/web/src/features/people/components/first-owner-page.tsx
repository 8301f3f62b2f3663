import { type FormEvent, useState } from 'react';
import { useQueryClient } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';

import { Choice, Field } from '../../../components/field';
import { fieldProblem, Refused } from '../../../components/refused';
import { api } from '../../../lib/api-client';

const ZONE = Intl.DateTimeFormat().resolvedOptions().timeZone;

/** The first day of a house: its name, zone, currency and step, and its owner. */
export function FirstOwnerPage() {
  const [form, setForm] = useState({
    house: '',
    town: '',
    zone: ZONE,
    baseCurrency: 'USD',
    step: '10',
    name: '',
    email: '',
    password: '',
  });
  const [error, setError] = useState<unknown>();
  const navigate = useNavigate();
  const client = useQueryClient();
  const field = (name: keyof typeof form) => ({
    value: form[name],
    onValue: (value: string) => setForm({ ...form, [name]: value }),
    problem: fieldProblem(error, name),
  });
  const submit = async (event: FormEvent) => {
    event.preventDefault();
    try {
      await api('/first-owner', { method: 'POST', body: { ...form, step: Number(form.step) } });
      client.clear();
      void navigate('/');
    } catch (problem) {
      setError(problem);
    }
  };
  return (
    <main className="min-h-full grid place-items-center p-4">
      <form
        className="paper w-full max-w-[560px] p-8 grid gap-4"
        onSubmit={(event) => void submit(event)}
      >
        <h1>A new house</h1>
        <p className="soft">Zone, base currency and step are fixed once the first goods move.</p>
        <div className="grid grid-cols-2 gap-4">
          <Field label="House" {...field('house')} autoFocus />
          <Field label="Town" {...field('town')} />
          <Field label="Time zone" {...field('zone')} />
          <Field label="Base currency" {...field('baseCurrency')} />
          <Choice
            label="The balance reads to"
            value={form.step}
            onValue={(step) => setForm({ ...form, step })}
            options={[
              ['10', '0.01 ct'],
              ['1', '0.001 ct'],
            ]}
          />
        </div>
        <h2>Its owner</h2>
        <Field label="Name" {...field('name')} />
        <Field label="E-mail" type="email" {...field('email')} autoComplete="username" />
        <Field
          label="Password"
          type="password"
          {...field('password')}
          autoComplete="new-password"
          help="At least 15 characters; a few words of your own do well."
        />
        <Refused error={error} />
        <button type="submit" className="btn primary justify-center">
          Open the house
        </button>
      </form>
    </main>
  );
}
