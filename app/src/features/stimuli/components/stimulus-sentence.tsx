import { NumberSlot, usualValues } from '@/components/sentence/number-slot';
import { Sentence, SlotSelect } from '@/components/sentence/slot';
import { formatFrequency, formatLevel, formatSampleRate, withUnit } from '@/lib/format/quantity';
import { kindOf, type NumberKey, RATES_HZ, type StimulusForm } from '../model/stimulus-form';
import { StimulusWays } from './stimulus-ways';

export interface StimulusSentenceProps {
  form: StimulusForm;
  /** The word that dsp refuses, and why. */
  refused: { key: string | null; why: string } | null;
  onChange: (key: string, value: string | null) => void;
}

const BITS = [
  { value: '16', label: '16 bits' },
  { value: '24', label: '24 bits' },
  { value: '32f', label: '32-bit floats' },
] as const;

const LEVELS = [0, -1, -3, -6, -10, -20] as const;
const DRAWN_BY_LOT: readonly string[] = ['white-noise', 'pink-noise', 'multitone', 'programme'];
const CEILINGS = [-3, -6, -10, -20] as const;

/** dsp's own, when none is given. */
const USUAL_SEED = 1;

/** Whether anything in the file is drawn by lot: noise, phases, dither. */
function hasSeed({ name, options: { bitsPerSample, dither } }: StimulusForm): boolean {
  const isDithered = kindOf(name).isDithered && bitsPerSample !== '32f' && dither !== 'none';
  return isDithered || DRAWN_BY_LOT.includes(name);
}

/** What the file will hold, word by word. */
export function StimulusSentence({ form, refused, onChange }: StimulusSentenceProps) {
  const { options } = form;
  const seed = options.seed ?? USUAL_SEED;
  const kind = kindOf(form.name);
  const { defaults } = kind;
  const errorOf = (key: string) => (refused?.key === key ? refused.why : undefined);
  const number = (
    key: NumberKey,
    label: string,
    value: number,
    unit: string,
    text: string,
    usual: readonly number[],
    usualValue: number | undefined,
  ) => (
    <NumberSlot
      label={label}
      text={text}
      value={value}
      unit={unit}
      usual={usualValues(usual, unit)}
      error={errorOf(key)}
      isChanged={usualValue !== undefined && value !== usualValue}
      onChange={(next) => onChange(key, next === usualValue ? null : String(next))}
    />
  );
  const rateOptions = RATES_HZ.map((rate) => ({ value: String(rate), label: formatSampleRate(rate) }));
  return (
    <Sentence>
      A file at{' '}
      <SlotSelect
        label="Sample rate"
        value={String(options.sampleRateHz)}
        options={rateOptions}
        onChange={(value) => onChange('rate', value)}
      />{' '}
      in{' '}
      <SlotSelect
        label="Bits"
        value={String(options.bitsPerSample) as '16' | '24' | '32f'}
        options={BITS}
        onChange={(value) => onChange('bits', value)}
      />
      {defaults.isQuick !== undefined && (
        <>
          {', '}
          <SlotSelect
            label="Form"
            value={options.isQuick ? 'quick' : 'full'}
            options={[
              { value: 'full', label: 'in full', detail: 'two minutes, every measure' },
              { value: 'quick', label: 'the quick form', detail: 'half a minute, the main measures' },
            ]}
            onChange={(value) => onChange('form', value === 'quick' ? 'quick' : null)}
          />
        </>
      )}
      <Tones form={form} number={number} />
      {defaults.levelDbfs !== undefined && (
        <>
          {', '}
          {form.name === 'programme' ? 'all of it' : form.name.endsWith('steps') ? 'from' : 'at'}{' '}
          {number(
            'level',
            'Level',
            options.levelDbfs ?? defaults.levelDbfs,
            'dBFS',
            formatLevel(options.levelDbfs ?? defaults.levelDbfs),
            LEVELS.filter((level) => level <= kind.highestLevelDbfs),
            defaults.levelDbfs,
          )}
          {form.name === 'programme' && ' against its own levels'}
        </>
      )}
      {!kind.isDigitalZero && (
        <>
          {', never above '}
          {number(
            'ceiling',
            'Ceiling',
            options.ceilingDbfs ?? 0,
            'dBFS',
            options.ceilingDbfs === undefined ? 'full scale' : formatLevel(options.ceilingDbfs),
            CEILINGS,
            0,
          )}
        </>
      )}
      {defaults.durationS !== undefined && (
        <>
          {', for '}
          {number(
            'duration',
            'Duration',
            options.durationS ?? defaults.durationS,
            's',
            withUnit(String(options.durationS ?? defaults.durationS), 's'),
            [5, 10, 30, 60],
            defaults.durationS,
          )}
        </>
      )}
      <StimulusWays form={form} onChange={onChange} />
      {hasSeed(form) && (
        <>
          {', of seed '}
          {number('seed', 'Seed', seed, '', String(seed), [], USUAL_SEED)}
        </>
      )}
      .
    </Sentence>
  );
}

type NumberWord = (
  key: NumberKey,
  label: string,
  value: number,
  unit: string,
  text: string,
  usual: readonly number[],
  usualValue: number | undefined,
) => React.ReactNode;

function Tones({ form: { name, options }, number }: { form: StimulusForm; number: NumberWord }) {
  const { defaults } = kindOf(name);
  const tone = (
    key: 'frequency' | 'low' | 'high',
    label: string,
    option: 'frequencyHz' | 'lowFrequencyHz' | 'highFrequencyHz',
    usual: readonly number[],
  ) => {
    const value = options[option] ?? defaults[option] ?? 0;
    return number(key, label, value, 'Hz', formatFrequency(value), usual, defaults[option]);
  };
  return (
    <>
      {defaults.frequencyHz !== undefined && (
        <>, a tone of {tone('frequency', 'Frequency', 'frequencyHz', [100, 997, 1000, 6000])}</>
      )}
      {defaults.lowFrequencyHz !== undefined && (
        <>
          , tones of {tone('low', 'Low frequency', 'lowFrequencyHz', [60, 250, 19_000])} and{' '}
          {tone('high', 'High frequency', 'highFrequencyHz', [7000, 8000, 20_000])}
        </>
      )}
    </>
  );
}
