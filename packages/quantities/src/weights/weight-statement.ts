import { readDecimal } from '../typed/read-decimal.js';
import type { MilliCarats } from './milli-carats.js';

/**
 * Whether a weight stated in decimals holds for what a stone weighs: right to the last decimal
 * written, one decimal right to the second, so `.5` covers .495 to .504 (16 CFR 23.18(c)). With three
 * decimals nothing but that weight holds. False for text that is no number of carats.
 */
export function decimalsHold(stated: string, actual: MilliCarats): boolean {
  const typed = stated.trim().replace(/\s*(ct|carats?)$/i, '');
  const reading = readDecimal(typed, { decimals: 3, what: 'Weight' });
  if (reading.kind !== 'ok') return false;
  const decimals = /[.,](\d*)$/.exec(typed)?.[1]?.length ?? 0;
  if (decimals >= 3) return actual === reading.value;
  return actual >= reading.value - 5 && actual <= reading.value + 4;
}

/**
 * What a written weight lacks, in sentences: points need decimal carats beside them (16 CFR
 * 23.18(b)); a fraction needs to say that it isn't exact and the range it covers (23.18(d)).
 */
export function weightStatementProblems(text: string): string[] {
  const problems: string[] = [];
  const hasDecimals = /\d*\.\d+\s*(ct|carats?)\b/i.test(text);
  if (/\d\s*(points?|pts?)\b/i.test(text) && !hasDecimals) {
    problems.push('A weight in points needs the decimal carats beside it.');
  }
  if (!/\d\s*\/\s*\d+\s*(ct|carats?)\b/i.test(text)) return problems;
  if (!/\b(not exact|approximate(ly)?|about)\b/i.test(text)) {
    problems.push('A weight in fractions has to say that it is not exact.');
  }
  if (!/\d*\.\d+\s*(to|-|–)\s*\d*\.\d+/i.test(text)) {
    problems.push('A weight in fractions needs the range in decimal carats that it covers.');
  }
  return problems;
}
