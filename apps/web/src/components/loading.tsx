import type { UseQueryResult } from '@tanstack/react-query';
import type { ReactNode } from 'react';

import { Refused } from './refused';

/** Shows what was asked for, says what is being done until it is there, and why where it can't be. */
export function Loaded<T>({
  query,
  says,
  children,
}: {
  query: UseQueryResult<T>;
  says: string;
  children(data: T): ReactNode;
}) {
  if (query.data !== undefined) return <>{children(query.data)}</>;
  if (query.isError)
    return (
      <div className="p-6">
        <Refused error={query.error} />
      </div>
    );
  return (
    <p className="p-6 soft" role="status">
      {says}
    </p>
  );
}
