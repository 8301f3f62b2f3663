import { useEffect, useRef, useState } from 'react';

/** The current row of a table by keys: arrows, PgUp, PgDn, Home, End. Keeps the row in view. */
export function useCurrentRow(count: number): {
  current: number;
  setCurrent(row: number): void;
  keys: { key: string; says: string; act(): void }[];
  body: React.RefObject<HTMLTableSectionElement | null>;
} {
  const [current, setRow] = useState(0);
  const body = useRef<HTMLTableSectionElement>(null);
  const setCurrent = (row: number) => setRow(Math.max(0, Math.min(count - 1, row)));
  useEffect(() => {
    if (current >= 0)
      body.current?.querySelector('tr.current')?.scrollIntoView({ block: 'nearest' });
  }, [current]);
  const silent = (key: string, row: () => number) => ({
    key,
    says: '',
    act: () => setCurrent(row()),
  });
  return {
    current: Math.min(current, Math.max(0, count - 1)),
    setCurrent,
    body,
    keys: [
      { key: '↓', says: 'move', act: () => setCurrent(current + 1) },
      silent('↑', () => current - 1),
      silent('PgDn', () => current + 15),
      silent('PgUp', () => current - 15),
      silent('Home', () => 0),
      silent('End', () => count - 1),
    ],
  };
}
