import type { PartyDetail } from '@foldwell/contracts';
import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';

import { ChangedMeanwhile } from '../../../components/changed-meanwhile';
import { Field, TextArea } from '../../../components/field';
import { fieldProblem, Refused } from '../../../components/refused';
import { api } from '../../../lib/api-client';
import { newerVersion, useKeptEdit } from '../../../lib/kept-edit';
import { useMay } from '../../../lib/session';
import { PARTY_WORDS, type PartyForm, partyForm, readParty } from './party-form';

/** Limit, terms and papers of a party; a colleague's newer version is shown beside yours. */
export function EditParty({ party }: { party: PartyDetail }) {
  const isOwner = useMay('owner');
  const may = useMay('owner', 'dealer', 'buyer');
  const client = useQueryClient();
  const { currency } = party.particulars;
  const newest = { values: partyForm(party.particulars), version: party.version };
  const { form, change, forget, version, refused } = useKeptEdit<PartyForm>(
    `party ${party.number}`,
    newest,
  );
  const [error, setError] = useState<unknown>();
  const [problems, setProblems] = useState<Partial<PartyForm>>({});
  const theirs = newerVersion<PartyDetail['particulars']>(error);
  const text = (name: keyof PartyForm) => ({
    label: PARTY_WORDS[name],
    value: form[name],
    onValue: (value: string) => change({ [name]: value }),
    problem: problems[name] ?? fieldProblem(error, name),
  });
  const save = async () => {
    const read = readParty(form, currency, isOwner);
    setProblems(read.problems);
    if (Object.keys(read.problems).length > 0) return;
    try {
      const asked = { method: 'PATCH', version, body: read.request } as const;
      await api(`/parties/${party.number}`, asked);
      setError(undefined);
      forget();
      await client.invalidateQueries();
    } catch (problem) {
      setError(problem);
      refused(problem);
    }
  };
  return (
    <aside className="side grid gap-3 content-start">
      <h2>Limit, terms and papers</h2>
      <div className="grid grid-cols-2 gap-3">
        {isOwner ? (
          <>
            <Field unit={currency} isNumber {...text('creditLimit')} />
            <Field unit={currency} isNumber {...text('memoLimit')} />
          </>
        ) : (
          <p className="col-span-2 tiny quiet">Limits, owner only. Ask an owner.</p>
        )}
        <Field unit="d" isNumber {...text('memoDays')} />
        <Field {...text('terms')} />
        <Field type="date" {...text('identityPapersUntil')} />
        <Field type="date" {...text('resaleCertificateUntil')} />
        <Field type="date" {...text('sanctionsCheckedOn')} />
        <Field {...text('contact')} />
        <Field {...text('email')} />
        <Field {...text('phone')} />
      </div>
      <TextArea {...text('address')} rows={2} />
      <TextArea {...text('note')} rows={2} />
      <p className="tiny quiet">
        Parties are checked by hand against sanctions lists; date and person are kept. Identity
        papers and notes are kept for this purpose only.
      </p>
      {theirs ? (
        <ChangedMeanwhile theirs={partyForm(theirs)} mine={form} words={PARTY_WORDS} />
      ) : (
        <Refused error={error} />
      )}
      {may ? (
        <button
          type="button"
          className="btn primary justify-self-start"
          onClick={() => void save()}
        >
          Keep changes
        </button>
      ) : (
        <p className="tiny quiet">Changing customers, owner, dealer and buyer only.</p>
      )}
    </aside>
  );
}
