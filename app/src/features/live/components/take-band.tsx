import { Button } from '@radix-ui/themes';
import { KeyCap } from '@/components/key-cap';
import { formatDuration } from '@/lib/format/quantity';
import { useLive } from '../hooks/live-bench-context';

const PHASES = {
  making: 'Making the signal',
  playing: 'Playing and recording',
  measuring: 'Measuring',
} as const;

/** How far a take has come, and the way to stop it. */
export function TakeBand({ onStop }: { onStop: () => void }) {
  const take = useLive((state) => state.take);
  if (!take) return null;
  const { title, phase, share, leftS, index, count, attempt } = take;
  const which = count > 1 ? `, ${index} of ${count}` : '';
  const again = attempt > 1 ? `, attempt ${attempt}` : '';
  return (
    <div className="bl-live-band">
      <p>
        <strong>{PHASES[phase]}</strong>: {title}
        {which}
        {again}
        {leftS !== null && leftS > 0 && `, ${formatDuration(leftS)} left`}
      </p>
      <progress max={1} value={share} aria-label={`${PHASES[phase]}: ${title}`} />
      <Button size="3" color="gray" highContrast disabled={phase === 'measuring'} onClick={onStop}>
        Stop the take <KeyCap>Esc</KeyCap>
      </Button>
    </div>
  );
}
