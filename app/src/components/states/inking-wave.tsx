import { useId } from 'react';
import './states.css';

const PERIODS = 8;
const PERIOD_PX = 17;
const WIDTH = PERIODS * PERIOD_PX;

/** Sine-like periods from half-waves; close enough to the eye and short in the markup. */
const WAVE = `M0 8${Array.from({ length: PERIODS }, () => `q${PERIOD_PX / 4} -13 ${PERIOD_PX / 2} 0q${PERIOD_PX / 4} 13 ${PERIOD_PX / 2} 0`).join('')}`;

export interface InkingWaveProps {
  /** 0 to 1; left out while no amount is known, when the wave stays pale. */
  share?: number | null;
  /** What is under way, for those who hear the page. */
  label: string;
}

/** Progress: a wave that inks in with the amount. Nothing spins. */
export function InkingWave({ share, label }: InkingWaveProps) {
  const clipId = useId();
  const known = typeof share === 'number' ? Math.min(1, Math.max(0, share)) : null;
  return (
    <svg
      className="bl-inking"
      width={WIDTH}
      height="16"
      viewBox={`0 0 ${WIDTH} 16`}
      role="progressbar"
      aria-label={label}
      aria-valuemin={0}
      aria-valuemax={100}
      aria-valuenow={known === null ? undefined : Math.round(known * 100)}
    >
      <clipPath id={clipId}>
        <rect width={WIDTH * (known ?? 0)} height="16" />
      </clipPath>
      <path className="bl-inking-pale" d={WAVE} />
      <path className="bl-inking-ink" d={WAVE} clipPath={`url(#${clipId})`} />
    </svg>
  );
}
