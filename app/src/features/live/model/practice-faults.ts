import { PRACTICE_DEVICES, type PracticeDevice, type PracticeStage } from '@benchlark/dsp';

/** Faults that a person puts into the practice device, beyond those it has; null: not there. */
export interface PracticeFaults {
  readonly unit: string;
  /** Level at which the left channel's positive half is cut off, dBFS. */
  readonly clipDbfs: number | null;
  /** Of a tone at full scale, dB against it. */
  readonly secondHarmonicDb: number | null;
  readonly thirdHarmonicDb: number | null;
  /** 50 Hz on the right channel. */
  readonly humDbfs: number | null;
  readonly noiseDbfs: number | null;
}

export const NO_FAULTS: PracticeFaults = {
  unit: 'clean',
  clipDbfs: null,
  secondHarmonicDb: null,
  thirdHarmonicDb: null,
  humDbfs: null,
  noiseDbfs: null,
};

export const PRACTICE_UNITS = Object.keys(PRACTICE_DEVICES);

const ratio = (levelDb: number): number => 10 ** (levelDb / 20);

/** sin² holds half of the second harmonic, sin³ a quarter of the third. */
function bends({ secondHarmonicDb, thirdHarmonicDb }: PracticeFaults): PracticeStage[] {
  if (secondHarmonicDb === null && thirdHarmonicDb === null) return [];
  const square = secondHarmonicDb === null ? 0 : 2 * ratio(secondHarmonicDb);
  const cube = thirdHarmonicDb === null ? 0 : 4 * ratio(thirdHarmonicDb);
  return [{ kind: 'polynomial', channel: 'both', coefficients: [1, square, cube] }];
}

/** The device as the practice worklet and the command line take it. */
export function practiceDeviceOf(faults: PracticeFaults): PracticeDevice {
  const unit = PRACTICE_DEVICES[faults.unit] ?? PRACTICE_DEVICES['clean'];
  if (!unit) throw new TypeError('there is no practice device');
  const { clipDbfs, humDbfs, noiseDbfs } = faults;
  return {
    ...unit,
    stages: [
      ...bends(faults),
      ...(clipDbfs === null
        ? []
        : [{ kind: 'clip', channel: 'left', positive: ratio(clipDbfs), negative: 2 } as const]),
      ...unit.stages,
      ...(humDbfs === null
        ? []
        : [{ kind: 'hum', channel: 'right', frequencyHz: 50, levelsDbfs: [humDbfs] } as const]),
      ...(noiseDbfs === null ? [] : [{ kind: 'noise', channel: 'both', levelDbfs: noiseDbfs } as const]),
    ],
  };
}
