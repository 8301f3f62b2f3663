import { useQueryClient } from '@tanstack/react-query';
import { type FormEvent, useState } from 'react';
import { useNavigate } from 'react-router-dom';

import { Field } from '../../../components/field';
import { fieldProblem, Refused } from '../../../components/refused';
import { api } from '../../../lib/api-client';
import { meQuery, useMe } from '../../../lib/session';

/** Everybody changes his own password; a first one must be changed before anything else. */
export function PasswordPage() {
  const me = useMe();
  const [current, setCurrent] = useState('');
  const [password, setPassword] = useState('');
  const [error, setError] = useState<unknown>();
  const client = useQueryClient();
  const navigate = useNavigate();
  const submit = async (event: FormEvent) => {
    event.preventDefault();
    try {
      await api('/password', { method: 'POST', body: { current, password } });
      await client.fetchQuery({ ...meQuery, staleTime: 0 });
      void navigate('/');
    } catch (problem) {
      setError(problem);
    }
  };
  return (
    <form className="p-6 grid gap-4 max-w-[460px]" onSubmit={(event) => void submit(event)}>
      <h1>{me.mustChangePassword ? 'Choose your own password' : 'Change password'}</h1>
      {me.mustChangePassword && (
        <p className="soft">
          This one was given to you. Nothing else opens until you have your own.
        </p>
      )}
      <Field
        label="Password now"
        type="password"
        value={current}
        onValue={setCurrent}
        autoComplete="current-password"
        autoFocus
      />
      <Field
        label="New password"
        type="password"
        value={password}
        onValue={setPassword}
        autoComplete="new-password"
        problem={fieldProblem(error, 'password')}
        help="At least 15 characters, at most 72 bytes. Every other session of yours ends."
      />
      <Refused error={error} />
      <button type="submit" className="btn primary justify-self-start">
        Keep password <kbd>Enter</kbd>
      </button>
    </form>
  );
}
