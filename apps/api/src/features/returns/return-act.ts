import { bringBack, bringBackRestated, type Legs, miss, together } from '@foldwell/ledger';

import type { Context } from '../../http/route.js';
import type { Act, NewDifference } from '../ledger/act.js';
import { switchAct } from './switched-stone.js';
import type { Weighed } from './weighed.js';

/** The act that an outcome posts. */
export async function returnAct(ctx: Context, weighed: Weighed): Promise<Act> {
  const { line, coming: out, request, judged } = weighed;
  const desk = { kind: 'return desk' } as const;
  const back = { kind: 'memo return', weighings: readings(weighed) };
  const differing = {
    weighings: readings(weighed, 'd'),
    newDifferences: [differenceOf(weighed, judged.outcome)],
  };
  switch (judged.outcome) {
    case 'agrees':
      return { ...back, ...bringBack(line.line, desk, out) };
    case 'restated':
      return {
        ...back,
        ...bringBackRestated(line.line, desk, out, { weight: request.weight, pieces: out.pieces }),
      };
    case 'excess':
      // What was expected is back; what is over lies in quarantine, unposted, until somebody answers.
      return { kind: 'memo return', ...differing, ...bringBack(line.line, desk, out) };
    case 'short':
    case 'pieces short':
      return { kind: 'memo return', ...differing, ...shortLegs(weighed) };
    case 'not found':
      return { kind: 'difference opened', ...differing, ...miss(line.line, { new: 'd' }, out) };
    case 'other weight':
      return {
        kind: 'memo return',
        ...differing,
        ...bringBack(line.line, { kind: 'quarantine' }, out),
      };
    default:
      return switchAct(ctx, weighed, differenceOf(weighed, 'suspected switch'));
  }
}

function readings({ line, request, judged }: Weighed, difference?: string): Act['weighings'] {
  return [
    {
      lot: line.line.lot,
      purpose: 'return',
      weight: request.weight,
      pieces: request.pieces ?? judged.pieces,
      reportRead: request.reportRead,
      lineId: line.line.lineId,
      ...(difference && { difference: { new: difference } }),
    },
  ];
}

function differenceOf({ line, coming, request, judged }: Weighed, kind: string): NewDifference {
  return {
    ref: 'd',
    lot: line.line.lot,
    lineId: line.line.lineId,
    kind,
    expectedWeight: coming.weight,
    foundWeight: request.weight,
    expectedPieces: coming.pieces,
    foundPieces: judged.pieces,
  };
}

function shortLegs({ line, coming, request, judged }: Weighed): Legs {
  const back = { weight: Math.min(request.weight, coming.weight), pieces: judged.pieces };
  const gone = { weight: coming.weight - back.weight, pieces: coming.pieces - back.pieces };
  return together(
    ...(back.weight > 0 ? [bringBack(line.line, { kind: 'return desk' }, back)] : []),
    miss(line.line, { new: 'd' }, gone),
  );
}
