import { decimalsForSignificant, formatNumber } from '@/lib/format/number';
import { withUnit } from '@/lib/format/quantity';
import { niceCeiling } from './axis-range';
import { type ChartModel, type ChartNote, type Highlight, slotOf, type TraceModel } from './chart-model';

export interface ResidualChannel {
  readonly name: string;
  /** Phase of the fundamental, degrees, 0 to 360. */
  readonly x: Float64Array;
  readonly residual: Float64Array;
  /** The wave itself, in any unit of the same kind. */
  readonly wave: Float64Array | null;
}

export interface ResidualParts {
  readonly channels: readonly ResidualChannel[];
  readonly yUnit: string;
  readonly highlights?: readonly Highlight[];
  readonly notes?: readonly ChartNote[];
}

/** The wave reaches so far up the residual's scale. */
const WAVE_SHARE = 0.8;

function greatest(values: Float64Array): number {
  return values.reduce((top, value) => Math.max(top, Math.abs(value)), 0);
}

export function residualModel({ channels, yUnit, highlights, notes }: ResidualParts): ChartModel {
  const top = niceCeiling(
    1.08 * channels.reduce((most, { residual }) => Math.max(most, greatest(residual)), 0),
  );
  const traces: TraceModel[] = channels.map(({ name, x, residual }, index) => ({
    id: name,
    name,
    kind: 'curve',
    slot: slotOf(index),
    x,
    y: residual,
  }));
  const first = channels.find(({ wave }) => wave !== null);
  const waveTop = first?.wave ? greatest(first.wave) : 0;
  if (first?.wave && waveTop > 0) {
    const scale = (WAVE_SHARE * top) / waveTop;
    const name = channels.length > 1 ? `wave, ${first.name}` : 'wave';
    traces.push({
      id: 'wave',
      name,
      kind: 'wave',
      slot: 5,
      x: first.x,
      y: first.wave.map((value) => value * scale),
    });
  }
  return {
    x: { quantity: 'Phase of the tone', unit: 'degrees', scale: 'linear', min: 0, max: 360, tickStep: 45 },
    y: { quantity: 'Residual', unit: yUnit, scale: 'linear', min: -top, max: top, isSigned: true },
    traces,
    highlights,
    notes,
    hasZeroLine: true,
    cornerWords: waveTop > 0 ? 'wave not to this scale' : undefined,
  };
}

/** Where each channel's residual is greatest, and on which half of the wave. */
export function residualInWords(channels: readonly ResidualChannel[], yUnit: string): string {
  const sentences = channels.map(({ name, x, residual }) => {
    const at = residual.reduce(
      (best, value, index) => (Math.abs(value) > Math.abs(residual[best] ?? 0) ? index : best),
      0,
    );
    const phaseDeg = x[at] ?? 0;
    const value = residual[at] ?? 0;
    const half = phaseDeg < 180 ? 'positive' : 'negative';
    const size = formatNumber(value, {
      decimals: Math.max(0, decimalsForSignificant(value, 2)),
      isSigned: true,
    });
    return `${name}: greatest ${withUnit(size, yUnit)} at ${formatNumber(phaseDeg, { decimals: 0 })}°, on the ${half} half of the wave.`;
  });
  return ['The residual over one period of the tone, the fundamental taken away.', ...sentences].join(' ');
}
