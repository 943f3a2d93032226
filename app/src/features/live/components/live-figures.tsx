import { proposeFindings, type ChannelResult } from '@benchlark/dsp';
import { Figure } from '@/components/figures/figure';
import { SeverityMark } from '@/components/figures/severity-mark';
import { WorthKey } from '@/components/figures/worth-mark';
import { MarginBlock } from '@/components/page/page';
import { useMemo } from 'react';
import { channelName } from '@/lib/capture-words';
import { describeFigure } from '@/lib/figures';
import { MINUS } from '@/lib/format/number';
import { worthOfFigure, type Worth } from '@/lib/worth';
import { useLive } from '../hooks/live-bench-context';

const SHOWN: Readonly<Record<string, readonly string[]>> = {
  tone: ['fundamentalLevelDbfs', 'thdDb', 'thdPlusNoiseDb', 'noiseDbfs', 'noiseAWeightedDbfs'],
  'two-tone': ['lowToneLevelDbfs', 'highToneLevelDbfs', 'modulationDistortionDb', 'differenceDistortionDb'],
  idle: ['noiseDbfs', 'noiseAWeightedDbfs', 'humDbfs', 'dcOffsetDbfs'],
};

const MOST_CHANNELS = 2;

/** The stored measure on the last moments, twice a second at most. */
export function LiveFigures() {
  const record = useLive((state) => state.figures?.record ?? null);
  if (!record) {
    return (
      <MarginBlock title="Figures now">
        <p className="bl-ink-2">They come with the first second of input.</p>
      </MarginBlock>
    );
  }
  const channels = record.channels.slice(0, MOST_CHANNELS);
  const keys = (SHOWN[record.measure] ?? []).filter((key) =>
    channels.some(({ figures }) => figures[key] !== undefined),
  );
  return (
    <MarginBlock title="Figures now">
      <table className="bl-table bl-live-figures">
        <thead>
          <tr>
            <th scope="col">
              <span className="bl-hidden">figure</span>
            </th>
            {channels.map(({ channel }) => (
              <th key={channel} scope="col">
                {channelName(channel)}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {keys.map((key) => {
            const { label, unit } = describeFigure(key);
            return (
              <tr key={key}>
                <th scope="row">
                  {label}
                  <span className="bl-table-second">{unit}</span>
                </th>
                {channels.map(({ channel, figures, limits }) => (
                  <td key={channel}>
                    <Figure
                      figureKey={key}
                      value={figures[key]}
                      limit={limits[key]}
                      size="live"
                      integerCh={4}
                      fractionCh={3}
                      uncertaintyCh={0}
                    />
                  </td>
                ))}
              </tr>
            );
          })}
        </tbody>
      </table>
      <WorthKey worths={worthsOf(keys, channels)} />
    </MarginBlock>
  );
}

function worthsOf(keys: readonly string[], channels: readonly ChannelResult[]): Worth[] {
  const all = channels.flatMap(({ figures, limits }) =>
    keys.map((key) => worthOfFigure(key, figures[key], limits[key])?.worth),
  );
  return [...new Set(all)].filter((worth) => worth !== undefined);
}

/** What the last moments show; becomes a finding when the take is kept. */
export function LiveShows() {
  const record = useLive((state) => (state.playing ? (state.figures?.record ?? null) : null));
  const findings = useMemo(() => (record ? proposeFindings(record) : []), [record]);
  if (!record) return null;
  return (
    <MarginBlock title="What it shows">
      {findings.length === 0 ? (
        <p className="bl-ink-2">Nothing out of the way.</p>
      ) : (
        <>
          {findings.slice(0, 3).map(({ code, severity, summary }, index) => (
            <p key={`${code}-${index}`} className="bl-live-shows">
              <SeverityMark severity={severity} hasWord /> {summary.replace(/-(?=\d)/g, MINUS)}
            </p>
          ))}
          <p className="bl-ink-2">Becomes a finding when the take is kept.</p>
        </>
      )}
    </MarginBlock>
  );
}
