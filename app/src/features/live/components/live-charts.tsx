import { useMemo, useState } from 'react';
import type { ChartSource } from '@/components/charts/chart-source';
import type { ChartState } from '@/components/charts/chart-state';
import { ResidualChart } from '@/components/charts/residual-chart';
import { residualScale } from '@/components/charts/residual-scale';
import { SpectrumChart } from '@/components/charts/spectrum-chart';
import { levelRange } from '@/components/charts/spectrum-model';
import { channelName } from '@/lib/capture-words';
import { formatNumber } from '@/lib/format/number';
import { withUnit } from '@/lib/format/quantity';
import { useLive } from '../hooks/live-bench-context';
import { useRigFloor } from '../hooks/use-rig-floor';
import { spanOf, tonesOf, type LiveForm } from '../model/live-form';
import type { SpectrumPicture } from '../worker/live-types';

const CHANNELS = ['left', 'right', 'ch3', 'ch4', 'ch5', 'ch6', 'ch7', 'ch8'] as const;
const LEVELS_DBFS = [-160, 0] as const;

interface LiveChartsProps {
  form: LiveForm;
  conditions: string;
  /** Of the rig's baseline. */
  baselineRecordId: string | null;
}

/** What comes out, and what is left of it over one wave. */
export function LiveCharts({ form, conditions, baselineRecordId }: LiveChartsProps) {
  const source: ChartSource = useMemo(
    () => ({ recordId: null, date: new Date().toISOString(), conditions, fileStem: 'live' }),
    [conditions],
  );
  return (
    <>
      <LiveSpectrum form={form} source={source} baselineRecordId={baselineRecordId} />
      <LiveResidual source={source} />
    </>
  );
}

function LiveSpectrum({
  form,
  source,
  baselineRecordId,
}: {
  form: LiveForm;
  source: ChartSource;
  baselineRecordId: string | null;
}) {
  const picture = useLive((state) => state.spectrum);
  const reference = useLive((state) => state.reference);
  const record = useLive((state) => state.figures?.record ?? null);
  const playing = useLive((state) => state.playing);
  const channels = useChannels(picture);
  const before = useChannels(reference);
  const references = useMemo(() => before.map((one) => ({ ...one, name: `${one.name}, kept` })), [before]);
  const levels = useSteadyLevels(channels);
  const isTone = playing?.form.signalId === 'tone' && record?.measure === 'tone';
  const harmonics = useMemo(
    () =>
      isTone && record
        ? record.channels.flatMap(({ channel, harmonics: found }) =>
            found.map(({ order, frequencyHz, levelDbr }) => ({
              channel: channelName(channel),
              order,
              frequencyHz,
              levelDbr,
            })),
          )
        : [],
    [isTone, record],
  );
  const fundamental = isTone ? record.channels[0]?.figures['fundamentalFrequencyHz'] : null;
  const fundamentalHz = typeof fundamental === 'number' ? fundamental : null;
  const { bandHz: wholeHz, isClose } = spanOf(form);
  const closeHz = isClose ? (tonesOf(form)[0] ?? null) : null;
  const highestHz = Math.min(wholeHz[1], (picture?.sampleRateHz ?? 2 * wholeHz[1]) / 2);
  const [lowHz, topHz] =
    closeHz === null ? [wholeHz[0], highestHz] : [Math.max(1, closeHz / 1.1), closeHz * 1.1];
  const bandHz = useMemo(() => [lowHz, topHz] as const, [lowHz, topHz]);
  const binHz = picture ? picture.sampleRateHz / picture.fftLength : null;
  const rigAlone = useRigFloor(baselineRecordId, binHz);
  return (
    <SpectrumChart
      title="Spectrum"
      sub={
        binHz === null
          ? 'waiting for sound'
          : `${withUnit(formatNumber(binHz, { decimals: 2 }), 'Hz')} a bin, ${picture?.averaged ?? 0} averaged in power`
      }
      state={stateOf(picture !== null)}
      channels={channels}
      references={references}
      rigAlone={rigAlone}
      fundamentalHz={closeHz === null ? fundamentalHz : null}
      harmonics={harmonics}
      bandHz={bandHz}
      levelsDbfs={levels}
      source={source}
    />
  );
}

function LiveResidual({ source }: { source: ChartSource }) {
  const record = useLive((state) => state.figures?.record ?? null);
  const isTone = record?.measure === 'tone' && record.channels.some(({ traces }) => traces['residual']);
  const { channels, unit } = useMemo(() => {
    if (!isTone) return { channels: [], unit: 'FS' };
    const found = record.channels.flatMap(({ channel, traces }) => {
      const { residual, wave } = traces;
      return residual && wave
        ? [
            {
              name: channelName(channel),
              residual: Float64Array.from(residual.y),
              wave: Float64Array.from(wave.y),
              x: Float64Array.from(residual.x),
              yUnit: residual.yUnit,
            },
          ]
        : [];
    });
    const scale = residualScale(
      found[0]?.yUnit ?? 'FS',
      found.map(({ residual }) => residual),
    );
    return {
      channels: found.map((one) => ({
        ...one,
        residual: one.residual.map((value) => value * scale.factor),
        wave: one.wave.map((value) => value * scale.factor),
      })),
      unit: scale.unit,
    };
  }, [isTone, record]);
  const state: ChartState = isTone
    ? { kind: 'ready' }
    : { kind: 'empty', children: 'Play a tone: what is left beside it stands here. Space plays.' };
  return (
    <ResidualChart
      sub="one period, averaged, fundamental taken away"
      state={state}
      channels={channels}
      yUnit={unit}
      source={source}
    />
  );
}

function stateOf(isThere: boolean): ChartState {
  return isThere
    ? { kind: 'ready' }
    : { kind: 'empty', children: 'The first spectrum comes once enough of the input has been heard.' };
}

/** A picture's channels with their frequencies, which stay the same from picture to picture. */
function useChannels(picture: SpectrumPicture | null) {
  const sampleRateHz = picture?.sampleRateHz ?? 0;
  const fftLength = picture?.fftLength ?? 0;
  const x = useMemo(
    () => Float64Array.from({ length: fftLength / 2 + 1 }, (_, k) => (k * sampleRateHz) / fftLength),
    [sampleRateHz, fftLength],
  );
  return useMemo(
    () => (picture?.levels ?? []).map((y, index) => ({ name: CHANNELS[index] ?? `ch${index + 1}`, x, y })),
    [picture, x],
  );
}

/** The axis grows when it must and never shrinks by itself: a live picture may not jump. */
function useSteadyLevels(channels: readonly { y: Float64Array }[]): readonly [number, number] {
  const [held, setHeld] = useState<readonly [number, number]>(LEVELS_DBFS);
  if (channels.length === 0) return held;
  const { min, max } = levelRange(channels);
  if (min >= held[0] && max <= held[1]) return held;
  const grown = [Math.min(held[0], min), Math.max(held[1], max)] as const;
  setHeld(grown);
  return grown;
}
