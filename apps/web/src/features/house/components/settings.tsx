import type { House } from '@foldwell/contracts';
import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';

import { ChangedMeanwhile } from '../../../components/changed-meanwhile';
import { Field, TextArea } from '../../../components/field';
import { fieldProblem, Refused } from '../../../components/refused';
import { api } from '../../../lib/api-client';
import { newerVersion, useKeptEdit } from '../../../lib/kept-edit';
import { useKeys } from '../../../lib/keys';
import { useMay } from '../../../lib/session';
import {
  NUMBERS,
  readSettings,
  SETTINGS_WORDS,
  type SettingsForm,
  settingsForm,
} from './settings-form';

/** Tolerances, terms and texts; several changes are kept at once. */
export function Settings({ house }: { house: House }) {
  const isOwner = useMay('owner');
  const client = useQueryClient();
  const newest = { values: settingsForm(house), version: house.version };
  const edit = useKeptEdit<SettingsForm>('house', newest);
  const { form, changed, change, forget, version, refused } = edit;
  const [error, setError] = useState<unknown>();
  const [problems, setProblems] = useState<Partial<SettingsForm>>({});
  const theirs = newerVersion<House>(error);
  const save = async () => {
    const read = readSettings(form, changed);
    setProblems(read.problems);
    if (changed.length === 0 || Object.keys(read.problems).length > 0) return;
    try {
      await api('/house', { method: 'PATCH', version, body: read.request });
      setError(undefined);
      forget();
      await client.invalidateQueries();
    } catch (problem) {
      setError(problem);
      refused(problem);
    }
  };
  const count = changed.length === 1 ? '1 change' : `${changed.length} changes`;
  useKeys(
    isOwner
      ? [{ key: 'Ctrl Enter', says: 'keep changes', act: () => void save(), inFields: true }]
      : [],
    changed.length > 0 ? `${count} not kept` : '',
  );
  const text = (name: keyof SettingsForm) => ({
    label: SETTINGS_WORDS[name],
    value: form[name],
    onValue: (value: string) => change({ [name]: value }),
    problem: problems[name] ?? fieldProblem(error, name),
  });
  return (
    <section className="min-w-0 border-l border-crease-2 p-6 grid gap-3 content-start">
      <h2>Tolerances and terms</h2>
      {NUMBERS.map(([name, , unit]) => (
        <Field key={name} unit={unit} isNumber {...text(name)} readOnly={!isOwner} />
      ))}
      <Field
        type="date"
        {...text('lockDate')}
        readOnly={!isOwner}
        help="Nothing is dated on or before it; a correction goes in the open month."
      />
      <TextArea
        rows={5}
        {...text('memoText')}
        label={`${SETTINGS_WORDS.memoText}, version ${house.memoTextVersion}`}
        isReadOnly={!isOwner}
        help="Draft until your counsel approves: have counsel in your country approve title, risk, sale or return, and any filing."
      />
      <TextArea
        rows={3}
        {...text('warrantyText')}
        isReadOnly={!isOwner}
        help="The house’s counsel gives the text. While it is empty no invoice of natural diamonds can be issued."
      />
      {theirs ? (
        <ChangedMeanwhile theirs={settingsForm(theirs)} mine={form} words={SETTINGS_WORDS} />
      ) : (
        <Refused error={error} />
      )}
      {isOwner ? (
        <button
          type="button"
          className="btn primary justify-self-start"
          disabled={changed.length === 0}
          onClick={() => void save()}
        >
          Keep {count} <kbd>Ctrl Enter</kbd>
        </button>
      ) : (
        <p className="tiny quiet">Settings, owner only. Ask an owner.</p>
      )}
    </section>
  );
}
