import { addDays, daysBetween } from '@foldwell/quantities';

import { setting } from './config/config.js';
import { makeDataSource } from './database/data-source.js';
import { DEMO_PASSWORD, openDemoHouse } from './features/demo/demo-house.js';
import { DemoYear } from './features/demo/demo-year.js';
import { diceFrom } from './features/demo/dice.js';
import { PEOPLE } from './features/demo/names.js';

// The demo house: a year of a house's days ending today, the same for the same number.
const option = (name: string, without: number) => {
  const at = process.argv.indexOf(`--${name}`);
  return at < 0 ? without : Number(process.argv[at + 1]);
};
const BATCH = 500;

const db = await makeDataSource(setting('DATABASE_URL'), 4).initialize();
const [people] = await db.query<{ n: number }[]>('SELECT count(*)::int AS n FROM person');
if (people?.n) {
  process.stderr.write('There is a house here already. "npm run reset" takes it away first.\n');
  process.exit(1);
}
const lots = option('lots', 400);
const house = await openDemoHouse(db);
const [today] = await db.query<{ today: string }[]>('SELECT house_today()::text AS today');
const last = today?.today ?? '';
const first = addDays(last, -364);
const year = new DemoYear(house, diceFrom(option('seed', 20261201)), last);

// Half is there on the first day; the rest is bought through the year.
const opening = Math.round(lots / 2);
for (let made = 0; made < opening; made += BATCH)
  await year.takeIn(first, 'opening', Math.min(BATCH, opening - made));
const buys = 26;
for (let day = addDays(first, 1); day <= last; day = addDays(day, 1)) {
  const n = daysBetween(first, day);
  if (n % 14 === 1 && n < 14 * buys) {
    let toBuy = Math.round((lots - opening) / buys);
    for (; toBuy > 0; toBuy -= BATCH)
      await year.takeIn(day, n % 98 === 57 ? 'consignment in' : 'purchase', Math.min(BATCH, toBuy));
  }
  if (day < last) await year.putAway(day);
  if (n % 2 === 0 || day > addDays(last, -20)) await year.send(day);
  if (day < addDays(last, -3)) await year.takeBack(day);
}
await year.findDifferences(3);
await db.destroy();
const names = PEOPLE.map(
  ({ name, roles }) => `${name.toLowerCase().replace('. ', '.')}@ostrey-tarn.example (${roles[0]})`,
).join(', ');
process.stdout.write(`Sign in as ${names}; the password of all is "${DEMO_PASSWORD}".\n`);
