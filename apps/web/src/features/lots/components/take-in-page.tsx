import type { PartyRow, PlaceRow, TakeInLot, TakeInRequest, TakenIn } from '@foldwell/contracts';
import { formatMoney, lineAmount, readCarats, readMoney, readPieces } from '@foldwell/quantities';
import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { Link } from 'react-router-dom';

import { Choice, Field } from '../../../components/field';
import { NarrowNotice } from '../../../components/narrow-notice';
import { Refused } from '../../../components/refused';
import { api } from '../../../lib/api-client';
import { useBookingKey, useKept } from '../../../lib/kept';
import { useKeys } from '../../../lib/keys';
import { useMay, useMe } from '../../../lib/session';
import { ParticularsFields } from './particulars-fields';
import { EMPTY_PARTICULARS, type ParticularsForm, readParticulars } from './particulars-form';

interface Form extends ParticularsForm {
  how: TakeInRequest['how'];
  party: string;
  paper: string;
  due: string;
  kind: TakeInLot['kind'];
  weight: string;
  pieces: string;
  isEstimated: string;
  origin: string;
  treatment: string;
  place: string;
  price: string;
  priceIs: 'carat' | 'sum';
  date: string;
}

const EMPTY: Form = {
  ...EMPTY_PARTICULARS,
  how: 'purchase',
  party: '',
  paper: '',
  due: '',
  kind: 'stone',
  weight: '',
  pieces: '1',
  isEstimated: 'counted',
  origin: '',
  treatment: '',
  place: '',
  price: '',
  priceIs: 'carat',
  date: '',
};

/** Goods come in: bought, consigned in, or opening stock; what is typed is kept until it is booked. */
export function TakeInPage() {
  const {
    house: { step, baseCurrency, priceCurrency },
  } = useMe();
  const may = useMay('owner', 'buyer');
  const client = useQueryClient();
  const [form, change, forget] = useKept<Form>('take in', EMPTY);
  const [problems, setProblems] = useState<Record<string, string>>({});
  const [error, setError] = useState<unknown>();
  const [done, setDone] = useState<TakenIn | null>(null);
  const [key, nextKey] = useBookingKey();
  const part = form.how === 'purchase' ? 'supplier' : 'consignor';
  const parties = useQuery({
    queryKey: ['parties', part],
    queryFn: () => api<PartyRow[]>(`/parties?part=${part}`),
    enabled: form.how !== 'opening',
  });
  const places = useQuery({ queryKey: ['places'], queryFn: () => api<PlaceRow[]>('/places') });
  const drawers = (places.data ?? []).filter(
    (place) => ['drawer', 'show'].includes(place.kind) && !place.isClosed,
  );
  const text = (name: keyof Form) => ({
    value: String(form[name]),
    onValue: (value: string) => change({ [name]: value }),
    problem: problems[name],
  });
  const book = async () => {
    const read = readForm(form, {
      step,
      baseCurrency,
      priceCurrency,
      drawer: form.place || drawers[0]?.id || '',
      party: form.party || parties.data?.[0]?.number || '',
    });
    setProblems(read.problems);
    setError(undefined);
    if (!read.request) return;
    try {
      setDone(await api<TakenIn>('/lots', { method: 'POST', key, body: read.request }));
      nextKey();
      forget();
      change({
        how: form.how,
        party: form.party,
        paper: form.paper,
        place: form.place,
        kind: form.kind,
        origin: form.origin,
        pieces: form.kind === 'stone' ? '1' : '',
      });
      void client.invalidateQueries();
    } catch (problem) {
      setError(problem);
    }
  };
  useKeys(
    [{ key: 'Ctrl Enter', says: 'take in', act: () => void book(), inFields: true }],
    'What you type is kept here',
  );
  if (!may) return <p className="p-6">Taking in goods, owner and buyer only. Ask an owner.</p>;
  return (
    <>
      <div className="head">
        <h1>Take in a lot</h1>
        <span className="soft">every carat that comes in is weighed, and comes from somewhere</span>
      </div>
      <NarrowNotice what="Taking in goods" />
      <div className="px-6 pb-6 grid gap-5 max-w-[1240px]">
        {done && (
          <div className="note" role="status">
            <b>
              {done.numbers.map((number) => (
                <Link key={number} to={`/lots/${number}`}>
                  {number}
                </Link>
              ))}{' '}
              taken in.
            </b>{' '}
            {done.warnings.flatMap((one) => one.sentences).join(' ')}
          </div>
        )}
        <div className="grid grid-cols-2 md:grid-cols-5 gap-3">
          <Choice
            label="How it comes in"
            {...text('how')}
            options={[
              ['purchase', 'bought'],
              ['consignment in', 'consigned in'],
              ['opening', 'opening stock'],
            ]}
          />
          {form.how !== 'opening' && (
            <Choice
              label={form.how === 'purchase' ? 'Supplier' : 'Consignor'}
              {...text('party')}
              options={(parties.data ?? []).map(
                (party) => [party.number, `${party.name}, C ${party.number}`] as const,
              )}
              help={
                parties.data?.length === 0 ? 'None yet; write one down under Customers.' : undefined
              }
            />
          )}
          <Field label="Their paper" {...text('paper')} />
          {form.how === 'consignment in' && (
            <Field label="Due back to them" type="date" {...text('due')} />
          )}
          <Field label="Business date, today without" type="date" {...text('date')} />
        </div>
        <div className="grid grid-cols-2 md:grid-cols-5 gap-3">
          <Choice
            label="Kind"
            value={form.kind}
            onValue={(kind) =>
              change({
                kind: kind as Form['kind'],
                pieces: kind === 'stone' ? '1' : kind === 'pair' ? '2' : '',
              })
            }
            options={[
              ['stone', 'stone'],
              ['pair', 'pair or set'],
              ['parcel', 'parcel'],
            ]}
          />
          <Field label="Weight on the balance" unit="ct" isNumber {...text('weight')} />
          <Field label="Pieces" unit="pcs" isNumber {...text('pieces')} />
          {form.kind === 'parcel' && (
            <Choice
              label="Pieces are"
              {...text('isEstimated')}
              options={[
                ['counted', 'counted'],
                ['estimated', 'estimated, about'],
              ]}
            />
          )}
          <Choice
            label="Drawer"
            {...text('place')}
            options={drawers.map((place) => [place.id, place.words] as const)}
          />
          <Choice
            label="Origin"
            {...text('origin')}
            options={[
              ['', 'say which'],
              ['natural', 'natural'],
              ['laboratory-grown', 'laboratory-grown'],
              ['not tested', 'not tested'],
            ]}
          />
          <Field label="Treatment, disclosed" {...text('treatment')} placeholder="none" />
          {form.how !== 'consignment in' && (
            <>
              <Choice
                label="Price is"
                {...text('priceIs')}
                options={[
                  ['carat', 'per carat'],
                  ['sum', 'a sum'],
                ]}
              />
              <Field
                label="What it cost"
                unit={form.priceIs === 'carat' ? `${baseCurrency}/ct` : baseCurrency}
                isNumber
                {...text('price')}
                help={costWords(form, step, baseCurrency)}
              />
            </>
          )}
        </div>
        <ParticularsFields form={form} change={change} problems={problems} kind={form.kind} />
        {form.how === 'consignment in' && (
          <p className="note">
            Their goods stay theirs and carry no cost of ours. Insurance: as entered; ask your
            insurer whether goods of others at this address are covered.
          </p>
        )}
        <Refused error={error} title="Not taken in." />
        <div className="flex gap-2">
          <button type="button" className="btn primary" onClick={() => void book()}>
            Take in {form.weight || 'it'} <kbd>Ctrl Enter</kbd>
          </button>
          <button
            type="button"
            className="btn"
            onClick={() => {
              forget();
              setProblems({});
            }}
          >
            Clear
          </button>
        </div>
      </div>
    </>
  );
}

function costWords(form: Form, step: 1 | 10, currency: string): string | undefined {
  const [weight, price] = [readCarats(form.weight, step), readMoney(form.price, currency)];
  if (weight.kind !== 'ok' || price.kind !== 'ok' || form.priceIs === 'sum') return undefined;
  return `${formatMoney(lineAmount(price.value, weight.value), currency)} in all`;
}

interface Around {
  step: 1 | 10;
  baseCurrency: string;
  priceCurrency: string;
  drawer: string;
  party: string;
}

function readForm(
  form: Form,
  around: Around,
): { request: TakeInRequest | null; problems: Record<string, string> } {
  const { request: particulars, problems } = readParticulars(form, around.priceCurrency);
  const { floor: _floor, ...written } = particulars;
  const weight = readCarats(form.weight, around.step);
  if (weight.kind !== 'ok') problems.weight = weight.why;
  const pieces = readPieces(form.pieces);
  if (pieces.kind !== 'ok') problems.pieces = pieces.why;
  if (form.origin === '')
    problems.origin = 'Say whether it is natural, laboratory-grown or not tested.';
  const price =
    form.how === 'consignment in'
      ? null
      : readMoney(form.price, around.baseCurrency, 'What it cost');
  if (price && price.kind !== 'ok') problems.price = price.why;
  if (Object.keys(problems).length > 0 || weight.kind !== 'ok' || pieces.kind !== 'ok')
    return { request: null, problems };
  const lot: TakeInLot = {
    ...written,
    kind: form.kind,
    weight: weight.value,
    pieces: pieces.value,
    isEstimated: form.kind === 'parcel' && form.isEstimated === 'estimated',
    origin: form.origin as TakeInLot['origin'],
    treatment: form.treatment,
    place: around.drawer,
    ...(price?.kind === 'ok' &&
      (form.priceIs === 'carat' ? { price: price.value } : { sum: price.value })),
  };
  return {
    problems,
    request: {
      how: form.how,
      paper: form.paper,
      lots: [lot],
      ...(form.how !== 'opening' && { party: around.party }),
      ...(form.due && { due: form.due }),
      ...(form.date && { businessDate: form.date }),
    },
  };
}
