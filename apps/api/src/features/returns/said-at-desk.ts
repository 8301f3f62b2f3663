import type { WeighBackRequest, WeighedBack } from '@foldwell/contracts';
import { formatCarats, formatPoints } from '@foldwell/quantities';

import type { FoundLine } from './weighed.js';

/** Asks whose stone lies on the balance, with what does not match. */
export function asks(line: FoundLine, { weight, reportRead }: WeighBackRequest): string {
  const off = formatPoints(weight - line.flows.out);
  const number =
    reportRead && !line.report.toUpperCase().endsWith(reportRead.trim().toUpperCase())
      ? ` Its number reads ${reportRead}, ours is ${line.report}.`
      : '';
  return `${line.lot} does not match: ${formatCarats(weight)} ct found, ${formatCarats(line.flows.out)} ct expected, ${off}.${number} Is it ours?`;
}

/** What one Enter did; `off` is how far the reading lies from what was expected, in thousandths. */
export function says(outcome: WeighedBack['outcome'], off: number): string {
  const words: Record<string, string> = {
    agrees: 'agrees',
    restated: `inside tolerance, restated ${formatPoints(off)}`,
    short: `${formatPoints(-off).replace('+', '')} missing, in hand`,
    excess: `${formatPoints(off)} over, in quarantine unposted`,
    'pieces short': 'pieces missing, in hand',
    'not found': 'not found, all of it missing',
    'other weight': 'whole to quarantine',
    'suspected switch': 'ours stays on the memo; what came lies in quarantine',
  };
  return words[outcome] ?? outcome;
}
