import { proposeFindings, type ChannelResult } from '@benchlark/dsp';
import { Figure } from '@/components/figures/figure';
import { SeverityMark } from '@/components/figures/severity-mark';
import { WorthKey } from '@/components/figures/worth-mark';
import { MarginBlock } from '@/components/page/page';
import { useMemo, useState } from 'react';
import { Sentence, SlotSelect } from '@/components/sentence/slot';
import { channelName } from '@/lib/capture-words';
import { describeFigure } from '@/lib/figures';
import { MINUS } from '@/lib/format/number';
import { worthOfFigure, type Worth } from '@/lib/worth';
import { useLive } from '../hooks/live-bench-context';
import { LEVEL_UNITS, readLevel, type LevelUnit } from '../model/level-units';
import type { RigUse } from '../model/rig-use';

const SHOWN: Readonly<Record<string, readonly string[]>> = {
  tone: ['fundamentalLevelDbfs', 'thdDb', 'thdPlusNoiseDb', 'noiseDbfs', 'noiseAWeightedDbfs'],
  'two-tone': ['lowToneLevelDbfs', 'highToneLevelDbfs', 'modulationDistortionDb', 'differenceDistortionDb'],
  idle: ['noiseDbfs', 'noiseAWeightedDbfs', 'humDbfs', 'dcOffsetDbfs'],
};

const MOST_CHANNELS = 2;

/** The stored measure on the last moments, twice a second at most. */
export function LiveFigures({ use }: { use: RigUse }) {
  const [unit, setUnit] = useState<LevelUnit>('dBFS');
  const record = useLive((state) => state.figures?.record ?? null);
  if (!record) {
    return (
      <MarginBlock title="Figures now">
        <p className="bl-ink-2">They come with the first second of input.</p>
      </MarginBlock>
    );
  }
  const channels = record.channels.slice(0, MOST_CHANNELS);
  const isCalibrated = channels.some(
    ({ figures }) => figures['noiseV'] !== undefined || figures['fundamentalLevelV'] !== undefined,
  );
  const shownUnit = isCalibrated ? unit : 'dBFS';
  const units = LEVEL_UNITS.filter((one) => one !== 'W' || use.loadOhm !== null);
  const keys = (SHOWN[record.measure] ?? []).filter((key) =>
    channels.some(({ figures }) => figures[key] !== undefined),
  );
  return (
    <MarginBlock title="Figures now">
      {isCalibrated && (
        <Sentence>
          Levels in{' '}
          <SlotSelect
            label="Level unit"
            value={shownUnit}
            options={units.map((one) => ({
              value: one,
              label: one === 'W' ? `W into ${use.loadOhm} Ω` : one,
            }))}
            onChange={setUnit}
          />
        </Sentence>
      )}
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
            const described = describeFigure(key);
            const { label } = described;
            const isLevel = readLevel(key, {}, shownUnit, null) !== null;
            return (
              <tr key={key}>
                <th scope="row">
                  {label}
                  <span className="bl-table-second">{isLevel ? shownUnit : described.unit}</span>
                </th>
                {channels.map(({ channel, figures, limits }) => (
                  <td key={channel}>
                    <Figure
                      {...(readLevel(key, figures, shownUnit, use.loadOhm) ?? {
                        figureKey: key,
                        value: figures[key],
                      })}
                      limit={shownUnit === 'dBFS' || !isLevel ? limits[key] : undefined}
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
