import type { ChangeHouseRequest, House } from '@foldwell/contracts';
import { readDecimal } from '@foldwell/quantities';

/** Numbers of the house: field, label, unit; points are kept in thousandths of a carat. */
export const NUMBERS = [
  ['stoneTolerance', 'Single stone, back from memo', 'pt'],
  ['parcelTolerance', 'Parcel, each weighing', 'pt'],
  ['formulaPercent', 'Weight by formula, of stated', '%'],
  ['acceptLimit', 'Bookkeeper accepts up to', 'pt'],
  ['writeOffLimit', 'Bookkeeper writes off up to', 'pt'],
  ['memoDays', 'Memo terms', 'd'],
  ['depositPercent', 'Deposit on what is kept', '%'],
] as const;
type NumberName = (typeof NUMBERS)[number][0];

/** The settings as typed. */
export type SettingsForm = Record<NumberName | 'lockDate' | 'memoText' | 'warrantyText', string>;

export const SETTINGS_WORDS = {
  ...(Object.fromEntries(NUMBERS.map(([name, label]) => [name, label])) as Record<
    NumberName,
    string
  >),
  lockDate: 'Books locked up to',
  memoText: 'Text on the memo',
  warrantyText: 'Warranty statement',
};

/** The settings as they would be typed. */
export function settingsForm(house: House): SettingsForm {
  const numbers = NUMBERS.map(([name, , unit]) => [
    name,
    String(unit === 'pt' ? house[name] / 10 : house[name]),
  ]);
  return {
    ...(Object.fromEntries(numbers) as Record<NumberName, string>),
    lockDate: house.lockDate ?? '',
    memoText: house.memoText,
    warrantyText: house.warrantyText,
  };
}

interface Read {
  request: ChangeHouseRequest;
  problems: Partial<SettingsForm>;
}

/** Reads the changed settings; each that can't be read says why, none is rounded. */
export function readSettings(form: SettingsForm, changed: readonly (keyof SettingsForm)[]): Read {
  const request: Record<string, string | number | null> = {};
  const problems: Read['problems'] = {};
  for (const name of changed) {
    const number = NUMBERS.find(([one]) => one === name);
    if (!number) {
      request[name] = name === 'lockDate' ? form[name] || null : form[name];
      continue;
    }
    const [, what, unit] = number;
    const reading = readDecimal(form[name], { decimals: unit === 'pt' ? 1 : 0, what, unit });
    if (reading.kind === 'ok') request[name] = reading.value;
    else problems[name] = reading.why;
  }
  return { request, problems };
}
