import type { PracticeDevice } from '@benchlark/dsp';
import type { CreateCalibrationDto } from '../rigs/dto/calibration.dto';
import type { CreateRigDto } from '../rigs/dto/rig.dto';
import type { CreateConditionDto, CreateUnitDto } from '../units/dto/write-unit.dto';

/**
 * The demo bench's books. Everybody and everything here is invented; every figure comes from passing stimuli through
 * these practice devices and analysing what comes out.
 */
export interface DemoTake {
  readonly fileName: string;
  /** One of dsp's stimuli. */
  readonly stimulus: string;
  /** The programme's short form. */
  readonly isQuick?: boolean;
  readonly device: PracticeDevice;
  readonly sampleRateHz: number;
  readonly bits: 16 | 24;
  readonly rig: string;
  readonly note: string;
  /** A recorder that lost its supply leaves the size field of the data unwritten. */
  readonly isCutOff?: boolean;
}

export interface DemoCondition {
  readonly condition: CreateConditionDto;
  readonly takes: readonly DemoTake[];
}

export interface DemoUnit {
  readonly unit: CreateUnitDto;
  readonly conditions: readonly DemoCondition[];
}

/** A calibration, dated from the day on which the demo is filled, so that its state is what the demo is to show. */
export interface DemoCalibration {
  readonly facts: Omit<CreateCalibrationDto, 'takenOn' | 'validUntil'>;
  readonly takenDaysAgo: number;
  readonly validForDays: number;
}

export interface DemoRig {
  readonly rig: CreateRigDto;
  readonly calibrations: readonly DemoCalibration[];
}

const lineIn: Omit<CreateCalibrationDto, 'range' | 'voltsRmsAtFullScale' | 'takenOn' | 'validUntil'> = {
  channel: 'all',
  direction: 'input',
  sampleRateHz: 96_000,
  frequencyHz: 997,
  meter: 'Thornley M6 bench meter, no. 1187',
  meterUncertaintyPercent: 0.35,
};

export const DEMO_RIGS: readonly DemoRig[] = [
  {
    rig: {
      name: 'Window bench',
      interface: 'Merrow Tait Gannet 2, in the rack',
      source: 'the desk computer over USB, or a memory stick',
      cables: 'balanced, 1.5 m, Osk Lane',
      supply: 'mains through the isolating transformer',
      load: '33 ohm load box, 10 W',
      limitDbfs: -1,
      notes: 'Balanced both ways. Let it warm up for half an hour.',
    },
    calibrations: [
      {
        facts: { ...lineIn, range: 'line in, pad off', voltsRmsAtFullScale: 6.94 },
        takenDaysAgo: 41,
        validForDays: 365,
      },
      {
        facts: {
          ...lineIn,
          range: 'line in, pad off, divider',
          voltsRmsAtFullScale: 3.52,
          dividerRatio: 10,
          loadOhm: 33,
          meterUncertaintyPercent: 0.6,
          notes: 'For power amplifiers. The divider is to be measured again before the next one.',
        },
        takenDaysAgo: 420,
        validForDays: 365,
      },
    ],
  },
  {
    rig: {
      name: 'Field recorder',
      interface: 'Pennock Field 24',
      supply: 'its own batteries',
      notes: 'Battery recorder for units that cannot leave their owner.',
    },
    calibrations: [],
  },
];

type Stage = PracticeDevice['stages'][number];

/** The rig's own converter and noise come last in every chain. */
function device(name: string, seed: number, stages: readonly Stage[], rigNoiseDbfs = -113): PracticeDevice {
  const rig: Stage[] = [
    { kind: 'gain', channel: 'both', gainDb: -1.2 },
    { kind: 'noise', channel: 'both', levelDbfs: rigNoiseDbfs },
    { kind: 'lead', channel: 'both', seconds: 0.6 },
  ];
  return { schema: 'benchlark-device/1', name, sampleRateHz: null, seed, stages: [...stages, ...rig] };
}

const slightCurve: Stage = { kind: 'polynomial', channel: 'both', coefficients: [1, 1.6e-5, 9e-6] };
/** 50 Hz and its multiples, strongest where rectifiers put them. */
const humRight: Stage = {
  kind: 'hum',
  channel: 'right',
  frequencyHz: 50.02,
  levelsDbfs: [-82.4, -76.1, -95.3, -84.8, -103.2, -92.7],
};
const humRest: Stage = { kind: 'hum', channel: 'both', frequencyHz: 50.02, levelsDbfs: [-118.5, -121.3] };

const corrieAsReceived = device('headphone amplifier, as received', 11, [slightCurve, humRight, humRest]);
const corrieOtherSupply = device('headphone amplifier, other supply', 12, [slightCurve, humRest]);
const candle = device(
  'converter',
  13,
  [
    { kind: 'polynomial', channel: 'both', coefficients: [1, 0, 4e-6] },
    { kind: 'clock', channel: 'both', ppm: 17.5 },
  ],
  -117,
);
const candleChain: readonly Stage[] = [
  { kind: 'filter', channel: 'both', type: 'high-pass', frequencyHz: 5, order: 1 },
  { kind: 'crosstalk', channel: 'both', levelDb: -96, slopeDbPerOctave: 6 },
  // The recorder is given room for waves between the samples.
  { kind: 'gain', channel: 'both', gainDb: -3 },
  { kind: 'clock', channel: 'both', ppm: 17.5 },
];
const candleCurve: Stage = { kind: 'polynomial', channel: 'both', coefficients: [1, 0, 4e-6] };
/** The converter's left output runs out of supply on one half, from -2.35 dBFS up. */
const candlePinched = device(
  'converter, left output stage held back',
  15,
  [candleCurve, { kind: 'clip', channel: 'left', positive: 0.763, negative: 2 }, ...candleChain],
  -109,
);
const candleMended = device(
  'converter after its output stage was mended',
  16,
  [candleCurve, ...candleChain],
  -109,
);
const strand = device('streamer', 14, [
  { kind: 'tone', channel: 'both', frequencyHz: 1000, levelDbfs: -101.5 },
  { kind: 'tone', channel: 'both', frequencyHz: 2000, levelDbfs: -108 },
  { kind: 'tone', channel: 'both', frequencyHz: 8000, levelDbfs: -104.2 },
  { kind: 'clock', channel: 'both', ppm: -42 },
]);

function threeTakes(
  stem: string,
  chain: PracticeDevice,
  note: string,
  sampleRateHz = 96_000,
): readonly DemoTake[] {
  const common = { device: chain, sampleRateHz, bits: 24, rig: 'Window bench', note } as const;
  return [
    { ...common, stimulus: 'sine', fileName: `${stem}-tone.wav` },
    { ...common, stimulus: 'silence', fileName: `${stem}-idle.wav` },
    { ...common, stimulus: 'low-level-tone', fileName: `${stem}-low.wav` },
  ];
}

export const DEMO_UNITS: readonly DemoUnit[] = [
  {
    unit: {
      maker: 'Fennwright',
      model: 'Corrie H2',
      serialNumber: '0093',
      kind: 'headphone-amplifier',
      notes: 'On loan from a reader who hears a low hum in the right ear between tracks.',
    },
    conditions: [
      {
        condition: { name: 'as received', notes: 'With its own plug-in supply.' },
        takes: threeTakes(
          'corrie-0093-received',
          corrieAsReceived,
          'Hum in the right ear, louder with the lamp on.',
        ),
      },
      {
        condition: { name: 'on linear supply', notes: 'The same unit on the bench supply; nothing opened.' },
        takes: threeTakes('corrie-0093-linear', corrieOtherSupply, 'Hum gone to the ear.'),
      },
    ],
  },
  {
    unit: {
      maker: 'Ostler and Daughters',
      model: 'Candle 4',
      serialNumber: '220417',
      kind: 'converter',
      notes: 'Bought over the counter.',
    },
    conditions: [
      {
        condition: { name: 'as bought', notes: '' },
        takes: [
          ...threeTakes('candle-220417', candle, ''),
          {
            fileName: 'candle-220417-programme.wav',
            stimulus: 'programme',
            device: candlePinched,
            sampleRateHz: 48_000,
            bits: 24,
            rig: 'Window bench',
            note: 'A rasp on loud piano, left alone. Played from a stick.',
          },
        ],
      },
      {
        condition: { name: 'after rework 1', notes: 'Left output stage mended by its maker.' },
        takes: [
          {
            fileName: 'candle-220417-mended.wav',
            stimulus: 'programme',
            isQuick: true,
            device: candleMended,
            sampleRateHz: 48_000,
            bits: 24,
            rig: 'Window bench',
            note: '',
          },
        ],
      },
    ],
  },
  {
    unit: { maker: 'Pallas Row', model: 'Strand S', serialNumber: 'PR-5518', kind: 'streamer', notes: '' },
    conditions: [
      {
        condition: { name: 'firmware 2.1', notes: 'Fed over USB.' },
        takes: threeTakes('strand-5518-usb', strand, 'A faint whistle with the volume up.', 48_000).slice(
          0,
          2,
        ),
      },
    ],
  },
];

/** What the recorder brought home and nobody has named yet. */
export const DEMO_UNSORTED: readonly DemoTake[] = [
  {
    fileName: 'ZOE_0014.wav',
    stimulus: 'sine',
    device: corrieOtherSupply,
    sampleRateHz: 44_100,
    bits: 16,
    rig: 'Field recorder',
    note: '',
  },
  {
    fileName: 'ZOE_0015.wav',
    stimulus: 'silence',
    device: strand,
    sampleRateHz: 48_000,
    bits: 24,
    rig: 'Field recorder',
    note: 'The battery gave out.',
    isCutOff: true,
  },
];
