import type { LotDetail, ParticularsRequest } from '@foldwell/contracts';
import { readMoney } from '@foldwell/quantities';
import { useState } from 'react';

import { ChangedMeanwhile } from '../../../components/changed-meanwhile';
import { Field } from '../../../components/field';
import { Refused } from '../../../components/refused';
import { api } from '../../../lib/api-client';
import { newerVersion, useKeptEdit } from '../../../lib/kept-edit';
import { useKeys } from '../../../lib/keys';
import { useMay, useMe } from '../../../lib/session';
import { ParticularsFields } from './particulars-fields';
import { type ParticularsForm, particularsForm, readParticulars } from './particulars-form';

/** Edits what is written about a lot; a colleague's newer version is shown beside yours. */
export function EditLot({
  lot,
  onDone,
  onLeave,
}: {
  lot: LotDetail;
  onDone(): void;
  onLeave(): void;
}) {
  const {
    house: { priceCurrency: currency },
  } = useMe();
  const isOwner = useMay('owner');
  const { form, change, forget, version, refused } = useKeptEdit<ParticularsForm>(lot.row.number, {
    values: particularsForm(lot.particulars, currency),
    version: lot.version,
  });
  const [error, setError] = useState<unknown>();
  const [problems, setProblems] = useState<Record<string, string>>({});
  const theirs = newerVersion<{ particulars: ParticularsRequest }>(error);
  const save = async () => {
    const read = readParticulars(form, currency);
    setProblems(read.problems);
    if (Object.keys(read.problems).length > 0) return;
    const { floor, ...request } = read.request;
    try {
      await api(`/lots/${lot.row.number}`, {
        method: 'PATCH',
        version,
        body:
          isOwner && readMoney(form.floor || '0', currency).kind === 'ok'
            ? { ...request, floor }
            : request,
      });
      forget();
      onDone();
    } catch (problem) {
      setError(problem);
      refused(problem);
    }
  };
  useKeys([
    { key: 'Ctrl Enter', says: 'keep', act: () => void save(), inFields: true },
    { key: 'Esc', says: 'leave', act: onLeave },
  ]);
  return (
    <section
      className="bg-tissue px-6 py-4 grid gap-3 border-b border-crease-2"
      aria-label={`Edit ${lot.row.number}`}
    >
      <h2>Edit {lot.row.number}</h2>
      <p className="small soft">
        Who, when, from and to are kept. Weights change only by weighing.
      </p>
      <ParticularsFields form={form} change={change} problems={problems} kind={lot.row.kind} />
      {isOwner ? (
        <Field
          label="Floor price"
          unit={`${currency}/ct`}
          isNumber
          value={form.floor}
          onValue={(floor) => change({ floor })}
          className="w-[160px]"
        />
      ) : (
        <p className="tiny quiet">Floor price, owner only.</p>
      )}
      {theirs && (
        <ChangedMeanwhile theirs={particularsForm(theirs.particulars, currency)} mine={form} />
      )}
      {!theirs && <Refused error={error} />}
      <div className="flex gap-2">
        <button type="button" className="btn primary" onClick={() => void save()}>
          Keep changes <kbd>Ctrl Enter</kbd>
        </button>
        <button
          type="button"
          className="btn"
          onClick={() => {
            forget();
            onLeave();
          }}
        >
          Leave as it was
        </button>
      </div>
    </section>
  );
}
