import { type InputHTMLAttributes, type ReactNode, type Ref, useId } from 'react';

interface FieldProps extends Omit<InputHTMLAttributes<HTMLInputElement>, 'onChange' | 'value'> {
  label: string;
  value: string;
  onValue(value: string): void;
  /** Said after the field: `ct`, `USD`. */
  unit?: string;
  /** What is wrong with it, in words. */
  problem?: string | undefined;
  help?: ReactNode;
  isNumber?: boolean;
  ref?: Ref<HTMLInputElement>;
  list?: string;
}

/** A label over a field; what is typed stays as typed, a problem is said under it. */
export function Field({
  label,
  value,
  onValue,
  unit,
  problem,
  help,
  isNumber,
  ref,
  className = '',
  ...rest
}: FieldProps) {
  const id = useId();
  const about = problem ?? help;
  return (
    <div className={`field ${isNumber ? 'number' : ''} ${problem ? 'bad' : ''} ${className}`}>
      <label htmlFor={id}>{label}</label>
      <span className="box">
        <input
          id={id}
          ref={ref}
          value={value}
          onChange={(event) => onValue(event.target.value)}
          autoComplete="off"
          spellCheck={false}
          aria-invalid={problem ? true : undefined}
          aria-describedby={about ? `${id}-about` : undefined}
          inputMode={isNumber ? 'decimal' : undefined}
          {...rest}
        />
        {unit && <span className="unit">{unit}</span>}
      </span>
      {about && (
        <span className="help" id={`${id}-about`} role={problem ? 'alert' : undefined}>
          {about}
        </span>
      )}
    </div>
  );
}

/** One of a few; a real select, so that keys and readers work as people know them. */
export function Choice({
  label,
  value,
  onValue,
  options,
  help,
  problem,
  className = '',
}: {
  label: string;
  value: string;
  onValue(value: string): void;
  options: readonly (readonly [value: string, words: string])[];
  help?: ReactNode;
  problem?: string | undefined;
  className?: string;
}) {
  const id = useId();
  return (
    <div className={`field ${problem ? 'bad' : ''} ${className}`}>
      <label htmlFor={id}>{label}</label>
      <span className="box">
        <select
          id={id}
          value={value}
          onChange={(event) => onValue(event.target.value)}
          aria-invalid={problem ? true : undefined}
        >
          {options.map(([one, words]) => (
            <option key={one} value={one}>
              {words}
            </option>
          ))}
        </select>
      </span>
      {(problem ?? help) && <span className="help">{problem ?? help}</span>}
    </div>
  );
}

/** Several lines of text. */
export function TextArea({
  label,
  value,
  onValue,
  rows = 3,
  help,
  isReadOnly,
}: {
  label: string;
  value: string;
  onValue(value: string): void;
  rows?: number;
  help?: ReactNode;
  isReadOnly?: boolean;
}) {
  const id = useId();
  return (
    <div className="field">
      <label htmlFor={id}>{label}</label>
      <span className="box">
        <textarea
          id={id}
          rows={rows}
          value={value}
          readOnly={isReadOnly}
          onChange={(event) => onValue(event.target.value)}
        />
      </span>
      {help && <span className="help">{help}</span>}
    </div>
  );
}
