import type { ChangePartyRequest, PartyDetail } from '@foldwell/contracts';
import { formatAmount, readDecimal, readMoney } from '@foldwell/quantities';

/** What is written about a party, as typed. */
export interface PartyForm {
  contact: string;
  email: string;
  phone: string;
  address: string;
  terms: string;
  memoDays: string;
  note: string;
  creditLimit: string;
  memoLimit: string;
  identityPapersUntil: string;
  resaleCertificateUntil: string;
  sanctionsCheckedOn: string;
}

/** As the screen calls them; in the order of the screen. */
export const PARTY_WORDS: Record<keyof PartyForm, string> = {
  creditLimit: 'Limit',
  memoLimit: 'Limit for one memo',
  memoDays: 'Memo terms',
  terms: 'Terms',
  identityPapersUntil: 'Identity papers until',
  resaleCertificateUntil: 'Resale certificate until',
  sanctionsCheckedOn: 'Sanctions lists checked on',
  contact: 'Contact',
  email: 'E-mail',
  phone: 'Telephone',
  address: 'Address',
  note: 'Notes',
};

type Particulars = PartyDetail['particulars'];
const DATES = ['identityPapersUntil', 'resaleCertificateUntil', 'sanctionsCheckedOn'] as const;

/** What is written now, as it would be typed; limits in the party's currency. */
export function partyForm(from: Particulars): PartyForm {
  // What a refusal holds comes from the database, where amounts are text.
  const plain = (amount: number | string | null) =>
    amount === null ? '' : formatAmount(Number(amount), from.currency, true).replaceAll(',', '');
  return {
    contact: from.contact,
    email: from.email,
    phone: from.phone,
    address: from.address,
    terms: from.terms,
    memoDays: String(from.memoDays),
    note: from.note,
    creditLimit: plain(from.creditLimit),
    memoLimit: plain(from.memoLimit),
    identityPapersUntil: from.identityPapersUntil ?? '',
    resaleCertificateUntil: from.resaleCertificateUntil ?? '',
    sanctionsCheckedOn: from.sanctionsCheckedOn ?? '',
  };
}

interface Read {
  request: ChangePartyRequest;
  problems: Partial<Record<keyof PartyForm, string>>;
}

/** Reads what was typed; each field that can't be read says why. Limits only for who may set them. */
export function readParty(form: PartyForm, currency: string, maySetLimits: boolean): Read {
  const problems: Read['problems'] = {};
  const { creditLimit, memoLimit, memoDays, ...rest } = form;
  const limit = (name: 'creditLimit' | 'memoLimit', text: string) => {
    if (text.trim() === '') return null;
    const reading = readMoney(text, currency, PARTY_WORDS[name]);
    if (reading.kind !== 'ok') problems[name] = reading.why;
    return reading.kind === 'ok' ? reading.value : null;
  };
  const days = readDecimal(memoDays, { decimals: 0, what: PARTY_WORDS.memoDays, unit: 'd' });
  if (days.kind !== 'ok') problems.memoDays = days.why;
  const dates = Object.fromEntries(DATES.map((name) => [name, rest[name] || null]));
  const limits = maySetLimits && {
    creditLimit: limit('creditLimit', creditLimit),
    memoLimit: limit('memoLimit', memoLimit),
  };
  const request = { ...rest, ...dates, ...(days.kind === 'ok' && { memoDays: days.value }) };
  return { request: { ...request, ...limits }, problems };
}
