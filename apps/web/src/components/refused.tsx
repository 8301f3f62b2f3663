import { Link } from 'react-router-dom';

import { Problem } from '../lib/api-client';

/** A refusal or a lost connection in words, with a way on where there is one; red wash. */
export function Refused({ error, title }: { error: unknown; title?: string }) {
  if (!error) return null;
  const path =
    error instanceof Problem && typeof error.body.path === 'string' ? error.body.path : null;
  const words =
    error instanceof Problem && typeof error.body.pathWords === 'string'
      ? error.body.pathWords
      : 'Open';
  const fields = error instanceof Problem ? (error.body.fields ?? []) : [];
  return (
    <div className="note stop" role="alert">
      {title && <b>{title} </b>}
      {error instanceof Error ? error.message : 'That did not work. Nothing was booked.'}
      {path && (
        <>
          {' '}
          <Link to={path}>{words}</Link>
        </>
      )}
      {fields.length > 1 && (
        <ul>
          {fields.slice(1, 8).map((field) => (
            <li key={field.field + field.message}>{field.message}</li>
          ))}
        </ul>
      )}
    </div>
  );
}

/** The sentence for one field of a refused form. */
export function fieldProblem(error: unknown, field: string): string | undefined {
  return error instanceof Problem
    ? error.body.fields?.find((one) => one.field === field)?.message
    : undefined;
}
