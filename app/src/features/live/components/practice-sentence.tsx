import { PRACTICE_DEVICES } from '@benchlark/dsp';
import { NumberSlot } from '@/components/sentence/number-slot';
import { Sentence, SlotSelect } from '@/components/sentence/slot';
import { formatLevel } from '@/lib/format/quantity';
import { PRACTICE_UNITS, type PracticeFaults } from '../model/practice-faults';

interface PracticeSentenceProps {
  faults: PracticeFaults;
  onChange: (faults: PracticeFaults) => void;
}

type FaultKey = Exclude<keyof PracticeFaults, 'unit'>;

const FAULTS: readonly {
  key: FaultKey;
  label: string;
  unit: string;
  usual: readonly number[];
  words: string;
}[] = [
  {
    key: 'clipDbfs',
    label: 'Left cut off at',
    unit: 'dBFS',
    usual: [-1, -2, -3, -6],
    words: 'its left channel’s positive half cut off at',
  },
  {
    key: 'secondHarmonicDb',
    label: 'Second harmonic',
    unit: 'dB',
    usual: [-90, -70, -50, -40],
    words: 'a second harmonic of',
  },
  {
    key: 'thirdHarmonicDb',
    label: 'Third harmonic',
    unit: 'dB',
    usual: [-90, -70, -50, -40],
    words: 'a third of',
  },
  {
    key: 'humDbfs',
    label: 'Hum, right',
    unit: 'dBFS',
    usual: [-100, -80, -60],
    words: 'hum on the right at',
  },
  { key: 'noiseDbfs', label: 'Noise', unit: 'dBFS', usual: [-110, -100, -90, -80], words: 'more noise of' },
];

/** At or under it a fault isn't there. */
const NONE_DB = -200;

/** The practice device in words: what it is, and what is wrong with it. */
export function PracticeSentence({ faults, onChange }: PracticeSentenceProps) {
  return (
    <Sentence>
      The practice device is{' '}
      <SlotSelect
        label="Practice device"
        value={faults.unit}
        options={PRACTICE_UNITS.map((name) => ({ value: name, label: PRACTICE_DEVICES[name]?.name ?? name }))}
        onChange={(unit) => onChange({ ...faults, unit })}
      />
      , with{' '}
      {FAULTS.map(({ key, label, unit, usual, words }, index) => {
        const value = faults[key];
        return (
          <span key={key}>
            {index > 0 && (index === FAULTS.length - 1 ? ' and ' : ', ')}
            {words}{' '}
            <NumberSlot
              label={label}
              text={value === null ? 'none' : formatLevel(value, unit)}
              value={value ?? NONE_DB}
              unit={unit}
              usual={[
                { value: NONE_DB, text: 'none' },
                ...usual.map((level) => ({ value: level, text: formatLevel(level, unit, 0) })),
              ]}
              isChanged={value !== null}
              onChange={(next) => onChange({ ...faults, [key]: next <= NONE_DB ? null : Math.min(next, 0) })}
            />
          </span>
        );
      })}
      .
    </Sentence>
  );
}
