import { useQuery, useQueryClient } from '@tanstack/react-query';
import { type FormEvent, useState } from 'react';
import { Navigate, useNavigate, useSearchParams } from 'react-router-dom';

import { Mark } from '../../../app/shell';
import { Field } from '../../../components/field';
import { Refused } from '../../../components/refused';
import { api } from '../../../lib/api-client';

/** Who is there: e-mail and password. */
export function SignInPage() {
  const [email, setEmail] = useState('');
  const [password, setPassword] = useState('');
  const [error, setError] = useState<unknown>();
  const [isWorking, setWorking] = useState(false);
  const [search] = useSearchParams();
  const navigate = useNavigate();
  const client = useQueryClient();
  const empty = useQuery({
    queryKey: ['first owner'],
    queryFn: () => api<{ isEmpty: boolean }>('/first-owner'),
  });
  if (empty.data?.isEmpty) return <Navigate to="/first-owner" replace />;
  const submit = async (event: FormEvent) => {
    event.preventDefault();
    setWorking(true);
    setError(undefined);
    try {
      await api('/sign-in', { method: 'POST', body: { email, password } });
      client.clear();
      const back = search.get('back') ?? '/';
      void navigate(back.startsWith('/') && !back.startsWith('//') ? back : '/');
    } catch (problem) {
      setError(problem);
      setWorking(false);
    }
  };
  return (
    <main className="min-h-full grid place-items-center p-4">
      <form
        className="paper w-full max-w-[420px] p-8 grid gap-4"
        onSubmit={(event) => void submit(event)}
      >
        <h1 className="flex items-center gap-3">
          <span className="w-8 inline-block">
            <Mark />
          </span>
          Foldwell
        </h1>
        <p className="soft">Every carat is somewhere. Sign in to see where.</p>
        <Field
          label="E-mail"
          type="email"
          value={email}
          onValue={setEmail}
          autoComplete="username"
          autoFocus
        />
        <Field
          label="Password"
          type="password"
          value={password}
          onValue={setPassword}
          autoComplete="current-password"
        />
        <Refused error={error} />
        <button type="submit" className="btn primary justify-center" disabled={isWorking}>
          Sign in <kbd>Enter</kbd>
        </button>
        <p className="tiny quiet">
          Nobody here can read your password. An owner of the house gives a new first one.
        </p>
      </form>
    </main>
  );
}
