import { NumberSlot, usualValues } from '@/components/sentence/number-slot';
import { Sentence, SlotSelect } from '@/components/sentence/slot';
import { formatFrequency, formatLevel, formatPoints } from '@/lib/format/quantity';
import { AVERAGES, DEFAULT_FORM, FFT_LENGTHS, hasLevel, SPANS, type LiveForm } from '../model/live-form';
import { SIGNALS, signalOf } from '../model/take-kinds';

interface LiveSentenceProps {
  form: LiveForm;
  sampleRateHz: number;
  onChange: (change: Partial<LiveForm>) => void;
}

const CHANNELS = [
  { value: 'both', label: 'both channels' },
  { value: 'left', label: 'the left alone' },
  { value: 'right', label: 'the right alone' },
] as const;
const LEVELS = [-40, -20, -10, -6, -3, -1, 0] as const;
const TONES_HZ = [20, 60, 100, 997, 6000, 10_000, 19_000] as const;

/** "Play [a steady tone] of [997 Hz] at [−20 dBFS] to [both channels], look at …", word by word. */
export function LiveSentence({ form, sampleRateHz, onChange }: LiveSentenceProps) {
  const signal = signalOf(form.signalId);
  const isSteady = signal.stimulus === null;
  const frequency = (label: string, key: 'frequencyHz' | 'lowFrequencyHz' | 'highFrequencyHz') => (
    <NumberSlot
      label={label}
      text={formatFrequency(form[key])}
      value={form[key]}
      unit="Hz"
      usual={usualValues(TONES_HZ, 'Hz')}
      isChanged={false}
      onChange={(next) => onChange({ [key]: Math.min(Math.max(next, 1), 0.49 * sampleRateHz) })}
    />
  );
  return (
    <Sentence>
      {isSteady ? 'Play ' : 'Take '}
      <SlotSelect
        label="Signal"
        value={form.signalId}
        options={SIGNALS.map(({ id, label, detail }) => ({ value: id, label, detail }))}
        onChange={(signalId) => onChange({ signalId, ...usualTones(signalId) })}
      />
      {form.signalId === 'tone' || signal.stimulus === 'sine' || signal.stimulus === 'level-steps' ? (
        <> of {frequency('Frequency', 'frequencyHz')}</>
      ) : null}
      {form.signalId === 'pair' ? (
        <>
          {' of '}
          {frequency('Low tone', 'lowFrequencyHz')} and {frequency('High tone', 'highFrequencyHz')}
        </>
      ) : null}
      {hasLevel(signal) && (
        <>
          {signal.id.endsWith('steps') ? ' from ' : ' at '}
          <NumberSlot
            label="Level"
            text={formatLevel(form.levelDbfs)}
            value={form.levelDbfs}
            unit="dBFS"
            usual={usualValues(LEVELS, 'dBFS')}
            isChanged={form.levelDbfs > DEFAULT_FORM.levelDbfs}
            onChange={(next) => onChange({ levelDbfs: Math.min(0, Math.max(-140, next)) })}
          />
        </>
      )}
      {' to '}
      <SlotSelect
        label="Channels"
        value={form.channels}
        options={CHANNELS}
        onChange={(channels) => onChange({ channels })}
      />
      {!isSteady && (
        <>
          {', '}
          <SlotSelect
            label="How often"
            value={String(form.times)}
            options={[
              { value: '1', label: 'once' },
              { value: '3', label: 'three times', detail: 'tells the spread' },
              { value: '5', label: 'five times', detail: 'tells the spread' },
            ]}
            onChange={(times) => onChange({ times: Number(times) })}
          />
        </>
      )}
      {', look at '}
      <SlotSelect
        label="Span"
        value={form.spanId}
        options={SPANS.map(({ id, label }) => ({ value: id, label }))}
        onChange={(spanId) => onChange({ spanId })}
      />
      {' with '}
      <SlotSelect
        label="Points"
        value={String(form.fftLength)}
        options={FFT_LENGTHS.map((points) => ({
          value: String(points),
          label: `${formatPoints(points)} points`,
        }))}
        onChange={(points) => onChange({ fftLength: Number(points) })}
      />
      {', averaging '}
      <SlotSelect
        label="Averages"
        value={String(form.averages)}
        options={AVERAGES.map((count) => ({
          value: String(count),
          label: count === 1 ? 'none' : String(count),
        }))}
        onChange={(count) => onChange({ averages: Number(count) })}
      />
      .
    </Sentence>
  );
}

/** Another signal starts from its usual tones. */
function usualTones(signalId: string): Partial<LiveForm> {
  return signalId === 'pair' ? { lowFrequencyHz: 60, highFrequencyHz: 7000 } : {};
}
