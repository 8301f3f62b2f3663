import type { TakeInLot } from '@foldwell/contracts';
import { SHAPES } from '@foldwell/quantities';

import type { Dice } from './dice.js';
import { LABORATORIES } from './names.js';

const SIEVES = [
  ['2', '6.5', 15],
  ['6.5', '11', 27],
  ['11', '14', 100],
  ['14', '16', 180],
] as const;

/** A lot as it could come in: mostly stones with reports, parcels by sieve, some pairs. Prices are invented. */
export function makeLot(dice: Dice, place: string, serial: number, isPriced: boolean): TakeInLot {
  const chance = dice.between(1, 100);
  const lot =
    chance <= 68
      ? makeStone(dice, serial)
      : chance <= 94
        ? makeParcel(dice)
        : makePair(dice, serial);
  const cost = Math.round(((lot.ask ?? 0) * (dice.between(74, 90) / 100)) / 100) * 100;
  return Object.assign(lot, { place, ...(isPriced && { price: cost }) });
}

function makeStone(dice: Dice, serial: number): TakeInLot {
  const weight = dice.percent(70) ? dice.between(30, 125) * 10 : dice.between(125, 420) * 10;
  const shape = dice.percent(62) ? 'Round' : dice.pick(SHAPES.slice(1, 8));
  const [colour, clarity] = [dice.between(1, 9), dice.between(3, 8)];
  const hasReport = dice.percent(92);
  const laboratory = dice.pick(LABORATORIES);
  const diameter = Math.cbrt(weight / 1000 / 0.0061 / 0.605);
  const round = (mm: number) => Math.round(mm * 100) * 10;
  return {
    kind: 'stone',
    weight,
    pieces: 1,
    origin: 'natural',
    place: '',
    shape,
    colourFrom: colour,
    colourTo: colour,
    clarityFrom: clarity,
    clarityTo: clarity,
    ...(shape === 'Round' && {
      cut: dice.pick([1, 1, 1, 2, 2, 3]),
      measureA: round(diameter - 0.02),
      measureB: round(diameter + 0.02),
      measureDepth: round(diameter * 0.605),
      proportions: {
        table: dice.between(54, 62),
        crownAngle: dice.between(66, 71) / 2,
        pavilionAngle: dice.between(202, 207) / 5,
      },
    }),
    polish: dice.pick([1, 1, 2]),
    symmetry: dice.pick([1, 2, 2]),
    fluorescence: dice.pick(['None', 'None', 'None', 'Faint', 'Medium']),
    ...(hasReport && {
      reportLaboratory: laboratory,
      reportNumber: `${laboratory === 'Norvane' ? '' : `${shape.slice(0, 2).toUpperCase()}-`}${21_100_000 + serial}`,
    }),
    ask: askOf(weight, colour, clarity, dice),
    miningCountry: dice.pick(['Botswana', 'Canada', 'Namibia', '']),
    miningEvidence: 'supplier’s statement',
  };
}

function makePair(dice: Dice, serial: number): TakeInLot {
  const each = dice.between(30, 90) * 10;
  const [colour, clarity] = [dice.between(2, 6), dice.between(5, 7)];
  return {
    kind: 'pair',
    weight: each * 2,
    pieces: 2,
    origin: 'natural',
    place: '',
    shape: 'Round',
    colourFrom: colour,
    colourTo: colour,
    clarityFrom: clarity,
    clarityTo: clarity,
    members: [
      { weight: each, laboratory: 'Norvane', report: `${22_000_000 + serial * 2}` },
      { weight: each, laboratory: 'Norvane', report: `${22_000_001 + serial * 2}` },
    ],
    ask: askOf(each, colour, clarity, dice),
  };
}

function makeParcel(dice: Dice): TakeInLot {
  const [sieveFrom, sieveTo, average] = dice.pick(SIEVES);
  const weight = dice.between(300, 4800) * 10;
  const colour = dice.between(2, 6);
  const clarity = dice.between(4, 8);
  const origin = dice.percent(84)
    ? 'natural'
    : dice.percent(60)
      ? 'not tested'
      : 'laboratory-grown';
  return {
    kind: 'parcel',
    weight,
    pieces: Math.max(1, Math.round((weight / average) * (dice.between(92, 108) / 100))),
    isEstimated: dice.percent(75),
    origin,
    place: '',
    shape: dice.percent(85) ? 'Round' : 'Baguette',
    sieveFrom,
    sieveTo,
    colourFrom: colour,
    colourTo: colour + 1,
    clarityFrom: clarity,
    clarityTo: Math.min(11, clarity + 1),
    ask: dice.between(26, 92) * 1000,
  };
}

/** Invented, but larger, whiter and cleaner costs more; minor units for a carat. */
function askOf(weight: number, colour: number, clarity: number, dice: Dice): number {
  const size = (weight / 1000) ** 0.9;
  return (
    Math.round(
      (5200 * size * (1.35 - colour * 0.055) * (1.5 - clarity * 0.09) * dice.between(93, 107)) /
        100,
    ) *
      100 +
    40_000
  );
}
