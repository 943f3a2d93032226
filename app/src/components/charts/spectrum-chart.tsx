import { useMemo } from 'react';
import { Chart } from './chart';
import type { ChartNote } from './chart-model';
import type { ChartSource } from './chart-source';
import type { ChartState } from './chart-state';
import {
  type SpectrumChannel,
  type SpectrumHarmonic,
  spectrumInWords,
  spectrumModel,
} from './spectrum-model';

export interface SpectrumChartProps {
  title?: string;
  sub?: string;
  heightPx?: number;
  state?: ChartState;
  /** In the record's order: the first is slot 1. Keep the identity. */
  channels: readonly SpectrumChannel[];
  rigAlone?: Pick<SpectrumChannel, 'x' | 'y'> | null;
  fundamentalHz?: number | null;
  harmonics?: readonly SpectrumHarmonic[];
  /** Shown range; the whole of the data from 20 Hz up when left out. */
  bandHz?: readonly [number, number];
  /** Shown range of levels, dBFS; found from the data when left out. */
  levelsDbfs?: readonly [number, number];
  /** Spectra of before. Keep the identity. */
  references?: readonly SpectrumChannel[];
  notes?: readonly ChartNote[];
  source: ChartSource;
}

/** What comes out: level over frequency, the channels over the rig alone, harmonics marked. */
export function SpectrumChart(props: SpectrumChartProps) {
  const { title = 'Spectrum', sub, heightPx = 372, state, source } = props;
  const { channels, rigAlone, fundamentalHz, harmonics, bandHz, levelsDbfs, references, notes } = props;
  const model = useMemo(
    () =>
      spectrumModel({
        channels,
        rigAlone,
        fundamentalHz,
        harmonics,
        bandHz,
        levelsDbfs,
        references,
        notes,
      }),
    [channels, rigAlone, fundamentalHz, harmonics, bandHz, levelsDbfs, references, notes],
  );
  const inWords = useMemo(
    () => spectrumInWords({ channels, harmonics, model }),
    [channels, harmonics, model],
  );
  return (
    <Chart
      title={title}
      sub={sub}
      heightPx={heightPx}
      state={state}
      source={source}
      model={model}
      inWords={inWords}
    />
  );
}
