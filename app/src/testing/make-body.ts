import type { ChannelResult, RecordBody } from '@benchlark/dsp';

/** A channel of a record that holds nothing; a test says only what matters to it. */
export function makeChannel(change: Partial<ChannelResult> = {}): ChannelResult {
  return {
    channel: 'left',
    figures: {},
    limits: {},
    uncertainty: {},
    harmonics: [],
    components: [],
    traces: {},
    ...change,
  };
}

/** A record's body without measured values. */
export function makeBody(change: Partial<RecordBody> = {}): RecordBody {
  return {
    measure: 'tone',
    settings: {
      fromS: 0,
      toS: 5,
      window: 'blackman-harris-7',
      fftLength: 65_536,
      bandLowHz: 20,
      bandHighHz: 20_000,
      highestHarmonic: 10,
      calibration: null,
      baseline: null,
    },
    reference: { unitFullScaleDbfs: null, from: null },
    stimulus: null,
    channels: [makeChannel(), makeChannel({ channel: 'right' })],
    between: { figures: {}, traces: {} },
    findings: [],
    warnings: [],
    segments: [],
    ...change,
  };
}
