import type { ChartModel } from '@/components/charts/chart-model';
import type { StimulusPreview } from '../worker/preview';

const LOWEST_HZ = 10;
const SPECTRUM_RANGE = { min: -180, max: 0 };

/** The first wave of the body. */
export function beginningModel({ beginning: { x, y } }: Pick<StimulusPreview, 'beginning'>): ChartModel {
  const peak = y.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  const top = peak > 0 ? peak * 1.1 : 1;
  return {
    x: { quantity: 'Time', unit: 'ms', scale: 'linear', min: 0, max: x[x.length - 1] ?? 1 },
    y: { quantity: 'Value', unit: 'of full scale', scale: 'linear', min: -top, max: top, isSigned: true },
    traces: x.length === 0 ? [] : [{ id: 'wave', name: 'the wave', kind: 'curve', slot: 1, x, y }],
    hasZeroLine: true,
  };
}

/** The spectrum of the body, from 10 Hz to half the rate. */
export function spectrumModel({
  spectrum: { x, y },
  descriptor,
}: Pick<StimulusPreview, 'spectrum' | 'descriptor'>): ChartModel {
  return {
    x: {
      quantity: 'Frequency',
      unit: 'Hz',
      scale: 'log',
      min: LOWEST_HZ,
      max: descriptor.sampleRateHz / 2,
    },
    y: { quantity: 'Level', unit: 'dBFS', scale: 'linear', ...SPECTRUM_RANGE },
    traces: x.length === 0 ? [] : [{ id: 'spectrum', name: 'as written', kind: 'spectrum', slot: 1, x, y }],
  };
}
