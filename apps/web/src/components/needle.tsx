import { formatPoints } from '@foldwell/quantities';

const TICKS = Array.from({ length: 21 }, (_, index) => index);
const WIDTH = 132;
const HALF = 60;

/** How far a weighing is from what was expected, in points; beyond ten it stands at the stop. Weights in thousandths of a carat. */
export function Needle({ off, tolerance }: { off: number; tolerance: number }) {
  const at = (points: number) => WIDTH / 2 + (Math.max(-10, Math.min(10, points)) * HALF) / 10;
  const isOff = Math.abs(off) > tolerance;
  const x = at(off / 10);
  return (
    <svg
      className={`needle ${isOff ? 'off' : ''}`}
      width={WIDTH}
      height="20"
      viewBox={`0 0 ${WIDTH} 20`}
      role="img"
      aria-label={
        off === 0
          ? 'level'
          : `${formatPoints(off)}${isOff ? ', outside tolerance' : ', inside tolerance'}`
      }
    >
      <rect
        className="tolerance"
        x={at(-tolerance / 10)}
        width={at(tolerance / 10) - at(-tolerance / 10)}
        y="8"
        height="10"
      />
      {TICKS.map((index) => (
        <line
          key={index}
          className="tick"
          x1={6 + index * 6}
          x2={6 + index * 6}
          y1="18"
          y2={index === 10 ? 8 : index % 5 === 0 ? 11 : 14}
        />
      ))}
      <line className="tick" x1="6" x2="126" y1="18" y2="18" />
      <line className="pointer" x1={x} x2={x} y1="3" y2="18" />
      <path className="tip" d={`M${x - 3.5} 0h7l-3.5 5z`} />
    </svg>
  );
}

/** The quiet tick of what agrees. */
export function Agrees({ children }: { children: string }) {
  return (
    <span className="status soft">
      <svg
        width="12"
        height="10"
        viewBox="0 0 12 10"
        fill="none"
        stroke="currentColor"
        strokeWidth="1.8"
        aria-hidden="true"
      >
        <path d="M1 5.5 4.2 8.7 11 1" />
      </svg>
      {children}
    </span>
  );
}
