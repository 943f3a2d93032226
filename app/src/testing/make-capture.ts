import type { Capture } from '@/lib/api-schema';

/** A plain stored and analysed capture; a test says only what matters to it. */
export function makeCapture(change: Partial<Capture> = {}): Capture {
  return {
    id: 'c1',
    number: 31,
    fileName: 'fjell-tone.wav',
    sizeBytes: 2_880_044,
    sha256: 'ab'.repeat(32),
    uploadedAt: '2026-11-19T10:40:00.000Z',
    uploadedBy: { id: 'p1', displayName: 'Jonah Pell' },
    note: '',
    unit: null,
    condition: null,
    rig: null,
    sampleRateHz: 96_000,
    channelCount: 2,
    bitsPerSample: 24,
    sampleFormat: 'integer',
    frameCount: 480_000,
    durationS: 5,
    fileWarnings: [],
    take: null,
    isPractice: false,
    sameBytesAs: [],
    evidence: 'sound',
    checkedAt: null,
    state: 'done',
    progress: null,
    failure: null,
    jobId: null,
    record: null,
    ...change,
  };
}
