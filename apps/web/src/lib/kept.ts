import { useCallback, useState } from 'react';

import { Offline } from './api-client';
import { useMe } from './session';

/**
 * What was typed into a form, kept in this browser through a reload, a refusal and a lost connection.
 * Each person has his own: somebody else at the same desk must not read a cost that was typed here.
 */
export function useKept<T>(name: string, empty: T): [T, (change: Partial<T>) => void, () => void] {
  const key = `foldwell form ${useMe().id} ${name}`;
  const [value, setValue] = useState<T>(() => {
    try {
      return { ...empty, ...(JSON.parse(localStorage.getItem(key) ?? '{}') as Partial<T>) };
    } catch {
      return empty;
    }
  });
  const change = useCallback(
    (part: Partial<T>) =>
      setValue((was) => {
        const next = { ...was, ...part };
        localStorage.setItem(key, JSON.stringify(next));
        return next;
      }),
    [key],
  );
  const forget = useCallback(() => {
    localStorage.removeItem(key);
    setValue(empty);
  }, [key, empty]);
  return [value, change, forget];
}

/**
 * A key for one booking, and how to say that it is settled: after an answer the next one gets a new
 * key; after a lost connection the same key is sent again, so that what was booked isn't booked twice.
 */
export function useBookingKey(): [string, (problem?: unknown) => void] {
  const [key, setKey] = useState(() => crypto.randomUUID());
  const settled = (problem?: unknown) => {
    if (!(problem instanceof Offline)) setKey(crypto.randomUUID());
  };
  return [key, settled];
}
