import { useId } from 'react';

const STEPS = 480;
const SWEEP_WIDTH = 400;
const MIDDLE = 418;
/** A sweep that falls in frequency and grows, as the lark's first wave takes it over. */
const FIRST_CYCLES_PER_UNIT = 0.036;
const LAST_CYCLES_PER_UNIT = 0.0098;

function sweepPath(): string {
  const ratio = Math.log(LAST_CYCLES_PER_UNIT / FIRST_CYCLES_PER_UNIT);
  // The phase is counted back from the end, so that the sweep arrives where the lark's own wave falls through zero.
  const cyclesTo = (x: number) =>
    ((FIRST_CYCLES_PER_UNIT * SWEEP_WIDTH) / ratio) * Math.exp((ratio * x) / SWEEP_WIDTH);
  const end = cyclesTo(SWEEP_WIDTH);
  return Array.from({ length: STEPS + 1 }, (_, n) => {
    const x = (n / STEPS) * SWEEP_WIDTH;
    const height = 2 + 46 * (x / SWEEP_WIDTH) ** 2;
    const y = MIDDLE + height * Math.sin(2 * Math.PI * (cyclesTo(x) - end));
    return `${n === 0 ? 'M' : 'L'}${x.toFixed(1)} ${y.toFixed(1)}`;
  }).join('');
}

const SWEEP = sweepPath();
/** The lark of the mark from its first wave on, 6.2 times its size; its line begins where the sweep ends. */
const LARK =
  'M9.6 33C11.8 39.5 15 39.8 17.6 33.6C20.6 26.6 27 25 33 23.4 37 22.3 38.6 17.2 37 12 42.3 12.4 46.6 14.4 48.4 18L58 14.4 50.4 22.8C51.8 34 46.6 43.4 37.2 47 29.5 50 19.5 49.4 7 58.5 16.5 47.4 31 45.6 38 33';
const LARK_SCALE = 7.7;

/** Decoration only: graph paper with one stroke on it. */
export function SweepDrawing() {
  const id = useId();
  return (
    <svg
      className="bl-entry-drawing"
      viewBox="0 0 832 868"
      preserveAspectRatio="xMinYMid slice"
      aria-hidden="true"
    >
      <defs>
        <pattern id={`${id}-minor`} width="19.4" height="19.4" patternUnits="userSpaceOnUse">
          <path d="M19.4 0V19.4H0" className="bl-entry-minor" />
        </pattern>
        <pattern id={`${id}-major`} width="97" height="97" patternUnits="userSpaceOnUse">
          <path d="M97 0V97H0" className="bl-entry-major" />
        </pattern>
      </defs>
      <rect width="100%" height="100%" fill={`url(#${id}-minor)`} />
      <rect width="100%" height="100%" fill={`url(#${id}-major)`} />
      <path className="bl-entry-stroke" d={SWEEP} />
      <path
        className="bl-entry-stroke"
        d={LARK}
        vectorEffect="non-scaling-stroke"
        transform={`translate(${SWEEP_WIDTH - 9.6 * LARK_SCALE} ${MIDDLE - 33 * LARK_SCALE}) scale(${LARK_SCALE})`}
      />
    </svg>
  );
}
