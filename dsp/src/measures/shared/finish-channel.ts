import { makeWarning } from '../../record/make-warning.js';
import type {
  Calibration,
  ChannelResult,
  FigureLimit,
  Figures,
  FigureUncertainty,
  Warning,
} from '../../record/record.js';
import type { AnalysisContext, AnalysisSettings } from '../measure.js';
import type { FigureScale } from './figure-scale.js';
import type { BaselineMatch } from './find-baseline.js';
import { limitFigures } from './limits.js';
import type { ChannelScan } from './scan-segment.js';
import { combineUncertainty, rigDeviation, type UncertaintyComponent } from './uncertainty.js';
import { addVolts, calibrationOf, isOtherRate } from './volts.js';
import { describeRecording, isOverloaded } from './describe-recording.js';

/** A channel as its measure leaves it, before what every measure adds alike. */
export interface ChannelDraft {
  readonly scan: ChannelScan;
  readonly figures: Figures;
  /** Components of uncertainty by figure, in the figure's unit. */
  readonly components: Readonly<Record<string, readonly UncertaintyComponent[]>>;
  readonly scales: readonly FigureScale[];
  readonly quantisationDb: Readonly<Record<string, number>>;
  readonly isTooShort: boolean;
  /** Limits that the measure knows itself, of figures that are only bounded. */
  readonly ownLimits: Readonly<Record<string, FigureLimit>>;
  readonly parts: Pick<ChannelResult, 'harmonics' | 'components' | 'traces'>;
  readonly warnings: readonly Warning[];
}

export interface FinishedChannel {
  readonly result: ChannelResult;
  readonly warnings: readonly Warning[];
}

/** Adds limits, uncertainty, volts and the recording's own warnings to a channel's figures. */
export function finishChannel(
  draft: ChannelDraft,
  settings: AnalysisSettings,
  context: AnalysisContext,
  baseline: BaselineMatch | null,
): FinishedChannel {
  const { scan } = draft;
  const { limits, warnings } = limitFigures({
    channel: scan.channel,
    figures: draft.figures,
    scales: draft.scales,
    baseline: baseline?.isApplicable === true ? (baseline.channels.get(scan.channel) ?? null) : null,
    quantisationDb: draft.quantisationDb,
    bits: context.capture.bitsPerSample,
    isOverloaded: isOverloaded(scan, context.capture),
    isTooShort: draft.isTooShort,
  });
  const uncertainty = combineAll(draft, limits);
  const rate = context.capture.sampleRateHz;
  const calibration = calibrationOf(settings.calibration, scan.channel, rate);
  const withVolts = addVolts({ figures: draft.figures, uncertainty }, calibration, scan.constant);
  return {
    result: {
      channel: scan.channel,
      figures: withVolts.figures,
      limits: { ...limits, ...draft.ownLimits },
      uncertainty: withVolts.uncertainty,
      ...draft.parts,
    },
    warnings: [
      ...describeRecording(scan, context.capture),
      ...draft.warnings,
      ...warnings,
      ...(settings.calibration && calibration === null
        ? [missingVolts(settings.calibration, scan.channel, rate)]
        : []),
    ],
  };
}

/** Why a channel has no volts although a calibration was given. */
function missingVolts(calibration: Calibration, channel: string, rate: number): Warning {
  return isOtherRate(calibration, rate)
    ? makeWarning(
        'calibration-not-applicable',
        { channel, calibrated: String(calibration.sampleRateHz), rate: String(rate) },
        { channel },
      )
    : makeWarning('calibration-incomplete', { channel }, { channel });
}

function combineAll(
  draft: ChannelDraft,
  limits: Readonly<Record<string, FigureLimit>>,
): Record<string, FigureUncertainty> {
  const uncertainty: Record<string, FigureUncertainty> = {};
  for (const [key, components] of Object.entries(draft.components)) {
    const value = draft.figures[key];
    if (typeof value !== 'number') continue;
    const limit = limits[key] as FigureLimit | undefined;
    const rig = limit?.by === 'rig' ? rigDeviation(value, limit.low, limit.high) : null;
    const combined = combineUncertainty(
      rig === null ? components : [...components, { name: 'rig', value: rig }],
    );
    if (combined !== null) uncertainty[key] = combined;
  }
  return uncertainty;
}

/** A channel without figures: every key there and null, and a warning that says why. */
export function emptyChannel(
  channel: string,
  keys: readonly string[],
  code: 'channel-silent' | 'tone-missing' | 'digital-silence',
): FinishedChannel {
  return {
    result: {
      channel,
      figures: Object.fromEntries(keys.map((key) => [key, null])),
      limits: {},
      uncertainty: {},
      harmonics: [],
      components: [],
      traces: {},
    },
    warnings: [makeWarning(code, { channel }, { channel, figures: keys })],
  };
}
