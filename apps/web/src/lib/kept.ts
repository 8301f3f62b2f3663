import { useCallback, useState } from 'react';

/** What was typed into a form, kept in this browser through a reload, a refusal and a lost connection. */
export function useKept<T>(name: string, empty: T): [T, (change: Partial<T>) => void, () => void] {
  const key = `foldwell form ${name}`;
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

/** A key for one booking: the same until it went through, so that sending it twice posts once. */
export function useBookingKey(): [string, () => void] {
  const [key, setKey] = useState(() => crypto.randomUUID());
  return [key, () => setKey(crypto.randomUUID())];
}
