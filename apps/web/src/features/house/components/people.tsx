import type { PersonRow } from '@foldwell/contracts';
import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';

import { Field } from '../../../components/field';
import { fieldProblem, Refused } from '../../../components/refused';
import { api } from '../../../lib/api-client';
import { useMay, useMe } from '../../../lib/session';

const ROLES = ['owner', 'dealer', 'buyer', 'bookkeeper', 'retailer'];

/** People of the house: roles, leave to see cost, taking away; a first password for a new one. */
export function People({ people }: { people: PersonRow[] }) {
  const me = useMe();
  const isOwner = useMay('owner');
  const client = useQueryClient();
  const [error, setError] = useState<unknown>();
  const [form, setForm] = useState({ name: '', email: '', password: '', party: '' });
  const [roles, setRoles] = useState<string[]>(['dealer']);
  const changed = () => client.invalidateQueries({ queryKey: ['people'] });
  const change = (person: PersonRow, body: object) =>
    void api(`/people/${person.id}`, { method: 'PATCH', version: person.version, body })
      .then(changed)
      .catch(setError);
  const add = async () => {
    setError(undefined);
    try {
      const { party, ...rest } = form;
      await api('/people', { method: 'POST', body: { ...rest, roles, ...(party && { party }) } });
      setForm({ name: '', email: '', password: '', party: '' });
      await changed();
    } catch (problem) {
      setError(problem);
    }
  };
  const text = (name: keyof typeof form) => ({
    value: form[name],
    onValue: (value: string) => setForm({ ...form, [name]: value }),
    problem: fieldProblem(error, name),
  });
  const toggle = (role: string) =>
    setRoles(roles.includes(role) ? roles.filter((one) => one !== role) : [...roles, role]);
  return (
    <section>
      <div className="section-head">
        <h2>People</h2>
        <span className="quiet small">
          {people.filter((person) => person.isActive).length} active
        </span>
      </div>
      <table>
        <caption>People</caption>
        <thead>
          <tr>
            <th scope="col">Name</th>
            <th scope="col">Role</th>
            <th scope="col">Last here</th>
            <th scope="col">Sees cost</th>
            <th scope="col" />
          </tr>
        </thead>
        <tbody>
          {people.map((person) => (
            <tr key={person.id}>
              <td className="lot">
                {person.name}
                <br />
                <span className="tiny quiet font-normal">{person.email}</span>
              </td>
              <td>
                {person.roles.join(', ')}
                {!person.isActive && <span className="red"> taken away</span>}
              </td>
              <td className="soft">
                {person.lastHereAt ? person.lastHereAt.slice(0, 16).replace('T', ' ') : 'not yet'}
              </td>
              <td>
                {person.seesCost ||
                person.roles.some((role) => ['owner', 'buyer', 'bookkeeper'].includes(role))
                  ? 'yes'
                  : 'no'}
              </td>
              <td className="whitespace-normal">
                {isOwner && person.id !== me.id && (
                  <span className="flex flex-wrap gap-x-3 tiny">
                    {person.roles.includes('dealer') && (
                      <button
                        type="button"
                        className="link"
                        onClick={() => change(person, { seesCost: !person.seesCost })}
                      >
                        {person.seesCost ? 'Cover cost' : 'Lay cost open'}
                      </button>
                    )}
                    <button
                      type="button"
                      className="link"
                      onClick={() =>
                        void api(`/people/${person.id}/sign-out`, { method: 'POST' }).catch(
                          setError,
                        )
                      }
                    >
                      Sign out everywhere
                    </button>
                    <button
                      type="button"
                      className="link"
                      onClick={() => change(person, { isActive: !person.isActive })}
                    >
                      {person.isActive ? 'Take away' : 'Give back'}
                    </button>
                  </span>
                )}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      {isOwner ? (
        <div className="px-6 py-3 grid grid-cols-2 gap-3">
          <Field label="Name" {...text('name')} />
          <Field label="E-mail" {...text('email')} />
          <div className="col-span-2 flex flex-wrap gap-3">
            {ROLES.map((role) => (
              <label key={role} className="check small">
                <input
                  type="checkbox"
                  checked={roles.includes(role)}
                  onChange={() => toggle(role)}
                />
                {role}
              </label>
            ))}
          </div>
          <Field
            label="First password, changed at first sign-in"
            {...text('password')}
            className="col-span-2"
          />
          {roles.includes('retailer') && <Field label="Their customer number" {...text('party')} />}
          <button
            type="button"
            className="btn justify-self-start self-end"
            onClick={() => void add()}
          >
            Ask somebody in
          </button>
        </div>
      ) : (
        <p className="px-6 py-2 tiny quiet">People, owner only. Ask an owner.</p>
      )}
      <div className="px-6">
        <Refused error={error} />
      </div>
      <p className="px-6 pb-2 tiny quiet">
        Whoever records a difference cannot answer it. Roles are read anew at each request.
      </p>
    </section>
  );
}
