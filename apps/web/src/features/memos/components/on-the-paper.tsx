import type { House } from '@foldwell/contracts';
import { formatCarats, formatPoints, longDate } from '@foldwell/quantities';

import type { MemoDraft } from './memo-draft';

/** What the paper will say, in thirds as it folds. */
export function OnThePaper({
  draft,
  due,
  customer,
  house,
}: {
  draft: MemoDraft;
  due: string;
  customer: string;
  house: House | undefined;
}) {
  if (!house) return null;
  const text = house.memoText
    .replaceAll('{house}', house.name)
    .replaceAll('{due date}', longDate(due))
    .replaceAll('{customer}', customer)
    .replaceAll('{Customer}', customer)
    .replaceAll('{price date}', longDate(draft.pricesUntil || due));
  return (
    <section className="mx-6 mt-auto paper max-md:hidden" aria-label="On the paper">
      <div className="bg-paper-2 px-8 py-1 small border-b border-crease">
        <b>On the paper</b>{' '}
        <span className="quiet">folds in three; number and bar code come at booking</span>
      </div>
      <div className="grid grid-cols-3 small soft">
        <p className="p-4">{text || 'The house has not written its memo text yet.'}</p>
        <p className="p-4 bg-paper-2 border-x border-crease">
          Weights are to <b>{house.step === 10 ? '0.01' : '0.001'} ct</b>. Parcels are weighed back;
          a difference over <b>{formatPoints(house.parcelTolerance).replace('+', '')}</b> is asked
          about before the memo closes. Stones: {formatCarats(house.stoneTolerance)} ct.
        </p>
        <p className="p-4">
          Handed to {draft.handedTo || '…'}, carried by {draft.carriedBy || '…'}.<br />
          <span className="tiny">
            Draft terms: have counsel in your country approve title, risk, sale or return, and any
            filing.
          </span>
        </p>
      </div>
    </section>
  );
}
