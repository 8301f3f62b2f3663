import type { PickUpAnswer } from '@foldwell/contracts';
import { useQuery } from '@tanstack/react-query';
import { type Ref, useImperativeHandle, useRef, useState } from 'react';
import { Link, useNavigate } from 'react-router-dom';

import { api } from '../lib/api-client';

export interface PickUpHandle {
  focus(): void;
  type(text: string): void;
}

/** The one field in the band: a lot, memo, customer or scanned code; Enter opens what was meant. */
export function PickUp({ ref }: { ref: Ref<PickUpHandle> }) {
  const input = useRef<HTMLInputElement>(null);
  const [text, setText] = useState('');
  const [at, setAt] = useState(0);
  const navigate = useNavigate();
  const { data } = useQuery({
    queryKey: ['pick up', text],
    queryFn: ({ signal }) =>
      api<PickUpAnswer>(`/pick-up?q=${encodeURIComponent(text)}`, { signal }),
    enabled: text.trim() !== '',
  });
  useImperativeHandle(ref, () => ({
    focus: () => input.current?.focus(),
    type: (typed) => {
      setText(typed);
      input.current?.focus();
    },
  }));
  const hits = text.trim() === '' ? [] : (data?.hits ?? []);
  const open = async () => {
    const answer = await api<PickUpAnswer>(`/pick-up?q=${encodeURIComponent(text)}`);
    const path = at > 0 ? hits[at]?.path : (answer.opens ?? answer.hits[0]?.path);
    if (!path) return;
    setText('');
    input.current?.blur();
    void navigate(path);
  };
  const onKeyDown = (event: React.KeyboardEvent) => {
    if (event.key === 'ArrowDown') setAt(Math.min(hits.length - 1, at + 1));
    else if (event.key === 'ArrowUp') setAt(Math.max(0, at - 1));
    else if (event.key === 'Enter') void open();
    else if (event.key === 'Escape') setText('');
    else return;
    event.preventDefault();
  };
  return (
    <search className="pick-up">
      <label>
        <svg
          viewBox="0 0 16 16"
          fill="none"
          stroke="currentColor"
          strokeWidth="1.4"
          aria-hidden="true"
        >
          <path d="M1.5 11.2 14.6 2.6M4.6 14.4 14.6 2.6M1.5 11.2c-.7 1.6 1.5 3.9 3.1 3.2" />
        </svg>
        <input
          ref={input}
          data-scans
          aria-label="Pick up a lot, memo or customer"
          placeholder="Pick up a lot, memo or customer"
          value={text}
          onChange={(event) => {
            setText(event.target.value);
            setAt(0);
          }}
          onKeyDown={onKeyDown}
          autoComplete="off"
          spellCheck={false}
        />
        <kbd>/</kbd>
      </label>
      {text.trim() !== '' && data && (
        <ul aria-label="Found">
          {hits.map((hit, index) => (
            <li key={hit.path} aria-current={index === at}>
              <Link to={hit.path} tabIndex={-1} onClick={() => setText('')}>
                <b>
                  {hit.kind === 'memo'
                    ? `M ${hit.number}`
                    : hit.kind === 'customer'
                      ? `C ${hit.number}`
                      : hit.number}
                </b>{' '}
                <span className={hit.tone === 'plain' ? 'soft' : 'red'}>
                  {hit.words}
                  {hit.tone === 'late' && ', late'}
                </span>
              </Link>
            </li>
          ))}
          {hits.length === 0 && (
            <li className="px-3 py-1 quiet">Nothing of ours has that number or name.</li>
          )}
        </ul>
      )}
    </search>
  );
}
