import { daysBetween, addDays, shortDate } from '@foldwell/quantities';

interface Due {
  number: string;
  due: string;
  value: number;
}

const WIDTH = 1392;
const DAY = WIDTH / 30.6;
const at = (days: number) => WIDTH / 2 + days * DAY;

/** A number is written only where the next bar leaves room for it; the table has them all. */
const isRoom = (day: number, next: number | undefined) =>
  day < 15 && (next === undefined || next - day > 1);

/** Memos by due date around today: height is value out, red is late; further ones stand at the ends. */
export function DueLine({ memos, today }: { memos: Due[]; today: string }) {
  const most = Math.max(1, ...memos.map((memo) => memo.value));
  const byDay = new Map<number, Due[]>();
  for (const memo of memos) {
    const day = Math.max(-15, Math.min(15, daysBetween(today, memo.due)));
    byDay.set(day, [...(byDay.get(day) ?? []), memo]);
  }
  const days = Array.from({ length: 29 }, (_, index) => index - 14);
  return (
    <svg
      className="due-line w-full h-auto"
      viewBox={`0 0 ${WIDTH} 92`}
      role="img"
      aria-label={`Due line: ${memos.length} memos by due date, 15 days back to 15 days ahead`}
    >
      <rect x="0" y="66" width={WIDTH / 2} height="3" className="late" />
      <text x="0" y="18">
        Due back. Height is value out; red is late.
      </text>
      <line x1="0" x2={WIDTH} y1="66" y2="66" className="base" />
      {days.map((day) => {
        const isWeek = day !== 0 && new Date(`${addDays(today, day)}T00:00:00Z`).getUTCDay() === 1;
        return (
          <g key={day}>
            <line
              x1={at(day)}
              x2={at(day)}
              y1="66"
              y2={day === 0 ? 12 : isWeek ? 58 : 62}
              className={day === 0 ? 'now' : 'base'}
            />
            {day === 0 && (
              <text x={at(0)} y="84" textAnchor="middle" className="today">
                Today
              </text>
            )}
            {isWeek && (
              <text x={at(day)} y="84" textAnchor="middle">
                {shortDate(addDays(today, day), today)}
              </text>
            )}
          </g>
        );
      })}
      {[...byDay]
        .sort(([a], [b]) => a - b)
        .map(([day, due], place, all) =>
          due.slice(0, 3).map((memo, index) => {
            const height = 8 + (38 * memo.value) / most;
            const x = at(day) - 5 + index * 13 + (day === 0 ? 8 : 0);
            return (
              <g key={memo.number}>
                <rect
                  x={x}
                  y={66 - height}
                  width="10"
                  height={height}
                  className={day < 0 ? 'late' : 'memo'}
                />
                {index === due.slice(0, 3).length - 1 && isRoom(day, all[place + 1]?.[0]) && (
                  <text x={x + 14} y={75 - height} className={day < 0 ? 'late' : ''}>
                    {due.length > 1 ? `${due[0]?.number} +${due.length - 1}` : memo.number}
                  </text>
                )}
              </g>
            );
          }),
        )}
    </svg>
  );
}
