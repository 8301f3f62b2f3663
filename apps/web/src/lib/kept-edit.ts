import { Problem } from './api-client';
import { useKept } from './kept';

/** A form over something that colleagues may change too. */
export interface KeptEdit<T> {
  /** What stands in the fields: typed text over the newest values. */
  form: T;
  /** Names of the fields that hold something else than the newest values. */
  changed: (keyof T & string)[];
  change(part: Partial<T>): void;
  forget(): void;
  /** The version that the typed text was begun from. */
  version: number;
  /** Told each refusal: after 412 the next try is over the version that was shown. */
  refused(problem: unknown): void;
}

/**
 * Typed text is kept with the version it was begun from, also through a reload, so that nothing newer
 * is written over unseen. Fields that nobody touched follow the newest values.
 */
export function useKeptEdit<T extends object>(
  name: string,
  newest: { values: T; version: number },
): KeptEdit<T> {
  const { values } = newest;
  const [kept, keep, forget] = useKept<Begun<T>>(`edit ${name}`, { typed: {}, version: 0 });
  const isBegun = Object.keys(kept.typed).length > 0;
  const version = isBegun ? kept.version : newest.version;
  const form = { ...values, ...kept.typed };
  const names = Object.keys(values) as (keyof T & string)[];
  return {
    form,
    changed: names.filter((one) => form[one] !== values[one]),
    change: (part) => keep({ typed: { ...kept.typed, ...part }, version }),
    forget,
    version,
    refused: (problem) => {
      const current = newerVersion<{ version: number }>(problem);
      if (current) keep({ version: current.version });
    },
  };
}

interface Begun<T> {
  typed: Partial<T>;
  version: number;
}

/** What stands there now, where a change was refused because somebody was first; null else. */
export function newerVersion<T>(problem: unknown): T | null {
  return problem instanceof Problem && problem.body.status === 412
    ? (problem.body.current as T)
    : null;
}
