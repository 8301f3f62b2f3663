/** A calendar day in the house's zone, `yyyy-MM-dd`. */
export type BusinessDate = string;

const DAYS = ['Sun', 'Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat'];
const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];
const DAY_MS = 86_400_000;

const at = (date: BusinessDate) => Date.parse(`${date}T00:00:00Z`);

/** Whether a text is a day of the calendar, as `yyyy-MM-dd`. */
export function isBusinessDate(text: string): boolean {
  return /^\d{4}-\d{2}-\d{2}$/.test(text) && !Number.isNaN(at(text)) && addDays(text, 0) === text;
}

/** The day so many days later (or earlier). */
export function addDays(date: BusinessDate, days: number): BusinessDate {
  return new Date(at(date) + days * DAY_MS).toISOString().slice(0, 10);
}

/** Days from one day to another, negative when it lies before. */
export function daysBetween(from: BusinessDate, to: BusinessDate): number {
  return Math.round((at(to) - at(from)) / DAY_MS);
}

/** `15 Dec`, with the year where it isn't this one. */
export function shortDate(date: BusinessDate, today?: BusinessDate): string {
  const [year = '', month = '1', day = '1'] = date.split('-');
  const same = today === undefined || today.startsWith(year);
  return `${Number(day)} ${MONTHS[Number(month) - 1]}${same ? '' : ` ${year}`}`;
}

/** `Tue 15 Dec 2026`. */
export function longDate(date: BusinessDate): string {
  return `${DAYS[new Date(at(date)).getUTCDay()]} ${shortDate(date)} ${date.slice(0, 4)}`;
}

/** `late 12 d`, `today`, `in 3 d`. */
export function dueWords(due: BusinessDate, today: BusinessDate): string {
  const days = daysBetween(today, due);
  if (days === 0) return 'today';
  return days < 0 ? `late ${-days} d` : `in ${days} d`;
}
