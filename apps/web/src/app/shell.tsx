import type { PickUpAnswer } from '@foldwell/contracts';
import { useQuery, useQueryClient } from '@tanstack/react-query';
import { Suspense, useRef, useState } from 'react';
import { Link, NavLink, Outlet, useNavigate } from 'react-router-dom';

import { Dialog } from '../components/dialog';
import { Refused } from '../components/refused';
import { api, Problem } from '../lib/api-client';
import { lettersAreOn } from '../lib/key-listener';
import { KeyLine, KeysProvider } from '../lib/keys';
import { meQuery, useMe } from '../lib/session';
import { PickUp, type PickUpHandle } from './pick-up';

/** Flaps of the band in the order of the day; further ones come with their sheets. */
const FLAPS = [
  { path: '/', letter: 'F', before: '', rest: 'irst light' },
  { path: '/lots', letter: 'L', before: '', rest: 'ots' },
  { path: '/memos', letter: 'M', before: '', rest: 'emos' },
  { path: '/returns', letter: 'R', before: '', rest: 'eturn desk' },
  { path: '/customers', letter: 'u', before: 'C', rest: 'stomers' },
] as const;
const LETTERS: Record<string, string> = {
  F: '/',
  L: '/lots',
  M: '/memos',
  R: '/returns',
  U: '/customers',
  H: '/house',
  T: '/lots/take-in',
  N: '/memos/new',
};

/** Band, desk and key line around every sheet of the house. */
export function Shell() {
  const navigate = useNavigate();
  const pickUp = useRef<PickUpHandle>(null);
  const [isHelp, setHelp] = useState(false);
  const scan = async (text: string) => {
    const { opens } = await api<PickUpAnswer>(`/pick-up?q=${encodeURIComponent(text)}`);
    if (opens) void navigate(opens);
    else pickUp.current?.type(text);
  };
  return (
    <KeysProvider
      go={(letter) => LETTERS[letter] && void navigate(LETTERS[letter])}
      focusPickUp={() => pickUp.current?.focus()}
      pickUpScan={(text) => void scan(text)}
      showAll={() => setHelp(true)}
    >
      <div className="frame">
        <Band pickUp={pickUp} />
        <main className="desk">
          <Suspense
            fallback={
              <p className="p-6 soft" role="status">
                Unfolding.
              </p>
            }
          >
            <Outlet />
          </Suspense>
        </main>
        <KeyLine />
        {isHelp && <AllKeys onLeave={() => setHelp(false)} />}
      </div>
    </KeysProvider>
  );
}

function Band({ pickUp }: { pickUp: React.RefObject<PickUpHandle | null> }) {
  const me = useMe();
  const { data } = useQuery({ ...meQuery, refetchInterval: 20_000 });
  const open = data?.house.differencesOpen ?? 0;
  return (
    <header className="band">
      <Link className="house" to="/">
        <Mark />
        {me.house.name}
      </Link>
      <nav className="flaps" aria-label="Main">
        {FLAPS.map(({ path, letter, before, rest }) => (
          <NavLink key={path} to={path} end={path === '/'}>
            <span>
              {before}
              <u>{letter}</u>
              {rest}
            </span>
            {path === '/returns' && open > 0 && (
              <span className="count">
                {open}
                <span className="sr-only"> to answer</span>
              </span>
            )}
          </NavLink>
        ))}
      </nav>
      <PickUp ref={pickUp} />
      <Who />
    </header>
  );
}

function Who() {
  const me = useMe();
  const client = useQueryClient();
  const navigate = useNavigate();
  const [isDark, setDark] = useState(document.documentElement.dataset.theme === 'dark');
  const [letters, setLetters] = useState(lettersAreOn());
  const [error, setError] = useState<unknown>();
  const leave = async (path: string) => {
    try {
      await api(path, { method: 'POST' });
    } catch (problem) {
      // Who isn't signed in any more has left.
      if (!(problem instanceof Problem && problem.body.status === 401)) return setError(problem);
    }
    client.clear();
    void navigate('/sign-in');
  };
  const turn = () => {
    const theme = isDark ? 'light' : 'dark';
    document.documentElement.dataset.theme = theme;
    localStorage.setItem('foldwell theme', theme);
    setDark(!isDark);
  };
  return (
    <details className="who">
      <summary>
        <b>{me.name}</b>
        <br />
        <span className="quiet">{me.roles.join(', ')}</span>
      </summary>
      <div className="menu">
        <Link to="/house">House</Link>
        <Link to="/password">Change password</Link>
        <button type="button" className="link" onClick={turn}>
          {isDark ? 'Light paper' : 'Dark paper, for counting'}
        </button>
        <button
          type="button"
          className="link"
          onClick={() => {
            localStorage.setItem('foldwell letters', letters ? 'off' : 'on');
            setLetters(!letters);
          }}
        >
          Single-letter keys {letters ? 'off' : 'on'}
        </button>
        <button type="button" className="link" onClick={() => void leave('/sign-out')}>
          Sign out
        </button>
        <button type="button" className="link" onClick={() => void leave('/sign-out-everywhere')}>
          Sign out everywhere
        </button>
        <Refused error={error} />
      </div>
    </details>
  );
}

/** All keys, for `?`. */
function AllKeys({ onLeave }: { onLeave(): void }) {
  return (
    <Dialog title="All keys" onLeave={onLeave}>
      <table className="inner">
        <tbody>
          {[
            ['G F', 'First light'],
            ['G L', 'Lots'],
            ['G M', 'Memos'],
            ['G N', 'Write a memo'],
            ['G R', 'Return desk'],
            ['G U', 'Customers'],
            ['G T', 'Take in a lot'],
            ['G H', 'House'],
            ['/', 'Pick up'],
            ['↑ ↓ PgUp PgDn Home End', 'move in a table'],
            ['Space', 'unfold a row'],
            ['X', 'select'],
            ['Enter', 'open, or add what the line says'],
            ['Ctrl Enter', 'book'],
            ['Esc', 'leave the field or the paper'],
            ['[ ]', 'previous, next'],
            ['a scan', 'goes to the open sheet’s line, or to Pick up'],
          ].map(([key, says]) => (
            <tr key={key}>
              <td>
                <kbd>{key}</kbd>
              </td>
              <td>{says}</td>
            </tr>
          ))}
        </tbody>
      </table>
      <form method="dialog">
        <button type="submit" className="btn">
          Leave <kbd>Esc</kbd>
        </button>
      </form>
    </Dialog>
  );
}

/** The mark of the house: a folded paper. */
export function Mark() {
  return (
    <svg viewBox="0 0 26 20" aria-hidden="true" stroke="var(--ink)">
      <path d="M.5 2.5h25v17H.5z" fill="var(--paper)" />
      <path d="M2.5 2.5 7 11.5h12l4.5-9z" fill="var(--tissue-2)" />
      <path d="M.5 19.5 7 11.5M25.5 19.5 19 11.5" fill="none" />
    </svg>
  );
}
