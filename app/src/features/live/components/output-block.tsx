import { Button } from '@radix-ui/themes';
import { MarginBlock } from '@/components/page/page';
import { formatLevel } from '@/lib/format/quantity';
import { voltsWords, type RigUse } from '../model/rig-use';

interface OutputBlockProps {
  levelDbfs: number;
  use: RigUse;
  isPractice: boolean;
  onChange: (levelDbfs: number) => void;
}

const LOWEST_DBFS = -140;

/** The level in steps of 1 dB: no fader that a sleeve can push up. */
export function OutputBlock({ levelDbfs, use, isPractice, onChange }: OutputBlockProps) {
  const highest = Math.min(0, use.limitDbfs);
  const step = (by: number) => onChange(Math.min(highest, Math.max(LOWEST_DBFS, levelDbfs + by)));
  return (
    <MarginBlock title="Output">
      <div className="bl-live-output">
        <Button
          variant="surface"
          color="gray"
          highContrast
          aria-label="1 dB quieter"
          disabled={levelDbfs <= LOWEST_DBFS}
          onClick={() => step(-1)}
        >
          −
        </Button>
        <output aria-live="polite">
          {formatLevel(levelDbfs)}
          {use.outputVrms !== null && !isPractice && `, ${voltsWords(use.outputVrms, levelDbfs)}`}
        </output>
        <Button
          variant="surface"
          color="gray"
          highContrast
          aria-label="1 dB louder"
          disabled={levelDbfs >= highest}
          onClick={() => step(1)}
        >
          +
        </Button>
      </div>
      <p className="bl-ink-2">
        {isPractice
          ? 'The practice device makes no sound: nothing leaves the computer.'
          : `A steady tone starts at −40 dBFS and rises over 3 s. No louder than ${formatLevel(highest)} on this rig.`}
      </p>
    </MarginBlock>
  );
}
