import type { SelfCheckResult } from '@benchlark/dsp';
import { Button } from '@radix-ui/themes';
import { Link } from 'react-router-dom';
import { Facts, MarginBlock, WarningBlock, type Fact } from '@/components/page/page';
import { formatDate } from '@/lib/format/date';
import { formatNumber } from '@/lib/format/number';
import { formatLevel, formatSampleRate, withUnit } from '@/lib/format/quantity';
import type { Delivered } from '../audio/audio-rig';
import { useLive, useLiveBench } from '../hooks/live-bench-context';
import { gridWords } from '../model/grid-words';
import type { RigUse } from '../model/rig-use';

/** What the browser really delivers, told from its own words and from the samples. */
export function RigBlock({ use, onCheck }: { use: RigUse; onCheck: () => void }) {
  const bench = useLiveBench();
  const delivered = useLive((state) => state.delivered);
  const grid = useLive((state) => state.input?.grid ?? null);
  const rateHz = useLive((state) => state.input?.sampleRateHz ?? null);
  const channelCount = useLive((state) => state.input?.channelCount ?? null);
  const check = useLive((state) => state.selfCheck);
  const isPractice = useLive((state) => state.choice?.kind === 'practice');
  const isTaking = useLive((state) => state.take !== null);
  if (!delivered) return null;
  const words = grid ? gridWords(grid) : null;
  return (
    <MarginBlock title="What is delivered">
      <Facts
        facts={[
          {
            term: 'in',
            detail: `${delivered.inputLabel}, ${channelCount ?? delivered.channelCount} channels`,
          },
          { term: 'rate', detail: rateWords(delivered, rateHz ?? delivered.inputRateHz) },
          { term: 'samples', detail: words?.short ?? 'not told yet' },
          {
            term: 'processing',
            detail: delivered.processing.length === 0 ? 'none' : delivered.processing.join(', '),
          },
          ...(isPractice ? [] : booksOf(use)),
          { term: 'read', detail: delivered.path === 'track' ? 'off the track itself' : 'by a worklet' },
        ]}
      />
      {words?.cost && (
        <WarningBlock lead="Not everything can be seen." wayOut={<Link to="/archive">Upload a file</Link>}>
          {words.cost}
        </WarningBlock>
      )}
      {delivered.processing.length > 0 && (
        <WarningBlock tone="fault" lead="The browser changes the sound.">
          {delivered.processing.join(' and ')} mixes the channels and bends the level: no figure taken so is
          worth anything. Choose another input or another browser.
        </WarningBlock>
      )}
      {!delivered.isOutputChosen && (
        <WarningBlock lead="The output can’t be chosen here.">
          This browser plays to the system’s own output: choose the interface in the system’s sound settings.
        </WarningBlock>
      )}
      <p className="bl-live-words">
        <Button
          variant="surface"
          color="gray"
          highContrast
          disabled={isTaking || check === 'running'}
          onClick={onCheck}
        >
          {check === 'running' ? 'Checking' : 'Check the rig'}
        </Button>{' '}
        <button type="button" className="bl-word" disabled={isTaking} onClick={() => void bench.close()}>
          Change the bench
        </button>
      </p>
      <div role="status">{check !== null && check !== 'running' && <CheckWords check={check} />}</div>
    </MarginBlock>
  );
}

/** What the rig's books give at this rate and range; without them levels stay against full scale. */
function booksOf({ calibration, baseline, range, limitDbfs }: RigUse): Fact[] {
  const none = 'none at this rate';
  return [
    {
      term: 'calibration',
      detail: calibration ? `of ${formatDate(calibration.content.date)}, ${range}` : none,
    },
    { term: 'rig alone', detail: baseline ? 'baseline on the books' : none },
    { term: 'limit', detail: limitDbfs < 0 ? formatLevel(limitDbfs) : 'none' },
  ];
}

function rateWords({ askedRateHz, outputRateHz }: Delivered, inputRateHz: number): string {
  const rate = formatSampleRate(inputRateHz);
  if (inputRateHz !== outputRateHz) return `${rate} in, ${formatSampleRate(outputRateHz)} out: resampled`;
  return inputRateHz === askedRateHz ? rate : `${rate}, not the ${formatSampleRate(askedRateHz)} asked for`;
}

function CheckWords({ check }: { check: SelfCheckResult }) {
  return (
    <ul className="bl-live-check-words">
      {(['left', 'right'] as const).map((side) => {
        const { input, gainDb, polarity, latencyS } = check[side];
        if (input === null || gainDb === null) {
          return <li key={side}>Output {side}: nothing came back. Check cable, mute and power.</li>;
        }
        const where =
          input === side ? `on ${side}, as it should` : input === 'both' ? 'on both' : `on ${input}`;
        return (
          <li key={side}>
            Output {side} came back {where}, {formatLevel(gainDb, 'dB')} against what was sent,{' '}
            {polarity === 'inverted' ? 'inverted' : 'upright'}, about{' '}
            {withUnit(formatNumber((latencyS ?? 0) * 1000, { decimals: 0 }), 'ms')} later.
          </li>
        );
      })}
    </ul>
  );
}
