import type { PartyRow } from '@foldwell/contracts';

import { Choice, Field } from '../../../components/field';
import type { MemoDraft } from './memo-draft';

interface Props {
  draft: MemoDraft;
  change(part: Partial<MemoDraft>): void;
  due: string;
  days: number;
  customers: PartyRow[];
}

/** To whom, until when, on which terms, by whose hand. */
export function MemoHead({ draft, change, due, days, customers }: Props) {
  return (
    <section className="flex flex-wrap gap-3 px-6 pb-3 border-b border-crease-2">
      <Choice
        label="Customer"
        value={draft.party}
        onValue={(party) => change({ party })}
        className="w-[250px]"
        options={[
          ['', 'choose'],
          ...customers.map((one) => [one.number, `${one.name}, C ${one.number}`] as const),
        ]}
      />
      <Field
        label="Handed to"
        value={draft.handedTo}
        onValue={(handedTo) => change({ handedTo })}
        className="w-[150px]"
      />
      <Field
        label="Terms"
        value={draft.terms}
        onValue={(terms) => change({ terms })}
        className="w-[180px]"
        placeholder={`${days} days`}
      />
      <Field
        label="Due back"
        type="date"
        value={due}
        onValue={(value) => change({ due: value })}
        className="w-[150px]"
      />
      <Field
        label="Prices held until"
        type="date"
        value={draft.pricesUntil || due}
        onValue={(pricesUntil) => change({ pricesUntil })}
        className="w-[150px]"
      />
      <Field
        label="Carried by"
        value={draft.carriedBy}
        onValue={(carriedBy) => change({ carriedBy })}
        className="grow min-w-[160px]"
      />
    </section>
  );
}
