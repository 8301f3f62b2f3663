import { CLARITIES, COLOURS, SHAPES } from '@foldwell/quantities';
import { type Ref, useState } from 'react';

import { Choice, Field } from '../../../components/field';

interface Props {
  search: URLSearchParams;
  set(change: Record<string, string>): void;
  fieldRef: Ref<HTMLInputElement>;
}

/** Shapes, carats, letters and place; ranges are typed (`D-J`) or pressed. */
export function SieveBar({ search, set, fieldRef }: Props) {
  const shapes = (search.get('shape') ?? '').split(',').filter(Boolean);
  const toggle = (shape: string) =>
    set({
      shape: (shapes.includes(shape)
        ? shapes.filter((one) => one !== shape)
        : [...shapes, shape]
      ).join(','),
    });
  const [from = '', to = ''] = (search.get('each') ?? '').split('-');
  return (
    <section
      className="flex flex-wrap gap-x-5 gap-y-2 px-6 pb-3 border-b border-crease-2 max-md:hidden"
      aria-label="Sieve"
    >
      <div className="field">
        <span>Shape</span>
        <div className="strip">
          {SHAPES.map((shape) => (
            <button
              key={shape}
              type="button"
              aria-pressed={shapes.includes(shape)}
              onClick={() => toggle(shape)}
            >
              {shape}
            </button>
          ))}
        </div>
      </div>
      <div className="flex gap-2 items-end">
        <Kept
          label="Carat, each stone"
          value={from}
          onKeep={(value) => set({ each: value || to ? `${value}-${to}` : '' })}
          className="w-[92px]"
          fieldRef={fieldRef}
        />
        <Kept
          label="to"
          value={to}
          onKeep={(value) => set({ each: from || value ? `${from}-${value}` : '' })}
          className="w-[76px]"
        />
      </div>
      <Strip
        label="Colour"
        scale={COLOURS.slice(0, 10)}
        value={search.get('colour') ?? ''}
        onValue={(colour) => set({ colour })}
      />
      <Strip
        label="Clarity"
        scale={CLARITIES}
        value={search.get('clarity') ?? ''}
        onValue={(clarity) => set({ clarity })}
      />
      <Choice
        label="Place"
        value={search.get('place') ?? ''}
        onValue={(place) => set({ place })}
        className="w-[150px]"
        options={[
          ['', 'anywhere'],
          ['safe', 'in a safe'],
          ['out', 'out'],
          ['returned', 'on the return desk'],
          ['sold', 'kept or sold'],
          ['missing', 'missing'],
        ]}
      />
      <Kept
        label="Lot, report or shape"
        value={search.get('q') ?? ''}
        onKeep={(q) => set({ q })}
        className="w-[150px]"
      />
    </section>
  );
}

/** A field that is taken when it is left or Enter is pressed. */
function Kept({
  label,
  value,
  onKeep,
  className,
  fieldRef,
}: {
  label: string;
  value: string;
  onKeep(value: string): void;
  className: string;
  fieldRef?: Ref<HTMLInputElement>;
}) {
  const [typed, setTyped] = useState<string | null>(null);
  const keep = () => {
    if (typed !== null && typed !== value) onKeep(typed.trim());
    setTyped(null);
  };
  return (
    <Field
      label={label}
      value={typed ?? value}
      onValue={setTyped}
      className={className}
      onBlur={keep}
      onKeyDown={(event) => {
        if (event.key === 'Enter') keep();
      }}
      {...(fieldRef && { ref: fieldRef })}
    />
  );
}

function Strip({
  label,
  scale,
  value,
  onValue,
}: {
  label: string;
  scale: readonly string[];
  value: string;
  onValue(value: string): void;
}) {
  const [from = '', to = from] = value.split('-');
  const [first, last] = [scale.indexOf(from), scale.indexOf(to)];
  const press = (grade: string) => {
    if (first < 0) onValue(grade);
    else if (first === last && grade !== from)
      onValue(scale.indexOf(grade) < first ? `${grade}-${from}` : `${from}-${grade}`);
    else onValue(grade === from && first === last ? '' : grade);
  };
  return (
    <div className="field">
      <span>{label}</span>
      <div className="strip">
        {scale.map((grade, index) => (
          <button
            key={grade}
            type="button"
            aria-label={`${label} ${grade}`}
            aria-pressed={first >= 0 && index >= first && index <= last}
            className={index === first || index === last ? 'end' : ''}
            onClick={() => press(grade)}
          >
            {grade}
          </button>
        ))}
      </div>
    </div>
  );
}
