import type { Rig, RigBaseline, RigCalibration } from '@/lib/api-schema';

/** A rig with an interface and nothing else noted; a test says only what matters to it. */
export function makeRig(change: Partial<Rig> = {}): Rig {
  return {
    id: 'g1',
    name: 'Window bench',
    interface: 'Gannet 2',
    source: '',
    cables: '',
    supply: '',
    load: '',
    limitDbfs: null,
    notes: '',
    createdAt: '2026-11-01T08:00:00.000Z',
    captureCount: 0,
    calibrationState: 'none',
    calibratedUntil: null,
    ...change,
  };
}

/** An input calibration that holds. */
export function makeCalibration(change: Partial<RigCalibration> = {}): RigCalibration {
  return {
    id: 'k1',
    rigId: 'g1',
    channel: 'all',
    direction: 'input',
    range: 'pad off',
    sampleRateHz: 96_000,
    frequencyHz: 997,
    voltsRmsAtFullScale: 3.52,
    dividerRatio: 1,
    fullScaleVrms: 3.52,
    loadOhm: null,
    meter: 'bench meter',
    meterUncertaintyPercent: 0.35,
    takenOn: '2026-11-02',
    validUntil: '2999-11-02',
    notes: '',
    createdAt: '2026-11-02T08:00:00.000Z',
    createdBy: { id: 'p1', displayName: 'Ilse Varga' },
    state: 'valid',
    isFollowed: false,
    retiredAt: null,
    ...change,
  };
}

export function makeBaseline(change: Partial<RigBaseline> = {}): RigBaseline {
  return {
    id: 'b1',
    captureId: 'c1',
    captureNumber: 31,
    recordId: 'r1',
    measure: 'tone',
    hasNewerRecord: false,
    inputRange: 'pad off',
    sampleRateHz: 96_000,
    createdAt: '2026-11-02T08:00:00.000Z',
    createdBy: { id: 'p1', displayName: 'Ilse Varga' },
    retiredAt: null,
    ...change,
  };
}
