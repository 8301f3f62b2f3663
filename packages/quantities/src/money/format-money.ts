import { grouped } from '../grouped.js';
import { minorDigits } from './minor-units.js';

/** `3,878.42` without its currency; whole figures lose their zeros when `short`. */
export function formatAmount(amount: number, currency: string, short = false): string {
  const digits = minorDigits(currency);
  const size = String(Math.abs(amount)).padStart(digits + 1, '0');
  const whole = grouped(size.slice(0, size.length - digits));
  const rest = size.slice(size.length - digits);
  const decimals = digits === 0 || (short && /^0*$/.test(rest)) ? '' : `.${rest}`;
  return `${amount < 0 ? '−' : ''}${whole}${decimals}`;
}

/** `3,878.42 USD`: number before the code. */
export function formatMoney(amount: number, currency: string): string {
  return `${formatAmount(amount, currency)} ${currency}`;
}

/** `420 USD/ct`. */
export function formatPrice(amount: number, currency: string): string {
  return `${formatAmount(amount, currency, true)} ${currency}/ct`;
}

/** `−32.5 %`, `+4 %`, `0 %` from hundredths of a percent. */
export function formatPercent(percent: number): string {
  const size = Math.abs(percent);
  const rest = String(size % 100)
    .padStart(2, '0')
    .replace(/0+$/, '');
  const sign = percent < 0 ? '−' : percent > 0 ? '+' : '';
  return `${sign}${grouped(String(Math.floor(size / 100)))}${rest === '' ? '' : `.${rest}`} %`;
}
