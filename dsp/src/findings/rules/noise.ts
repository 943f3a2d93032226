import type { FigureLimit, Finding } from '../../record/record.js';
import { numberIn, strongestLine, type RecordView } from '../record-view.js';
import { channelWord, makeFinding, proof, rounded } from '../words.js';

/** Mains hum in dBFS (common practice, no source): heard as a hum beside quiet music from about -80 on. */
const HUM = { note: -105, caution: -92, fault: -72 } as const;
/** Hum counts only where it is a good part of the noise. */
const HUM_UNDER_NOISE_DB = 15;
/** Lines of frames in dBFS (common practice, no source). */
const FRAME = { note: -115, caution: -100, fault: -80 } as const;

function severityOf(
  value: number,
  limits: { note: number; caution: number; fault: number },
): Finding['severity'] | null {
  if (value >= limits.fault) return 'fault';
  if (value >= limits.caution) return 'caution';
  return value >= limits.note ? 'note' : null;
}

/** Lines of 50 or 60 Hz and its multiples in the idle noise. */
export function mainsHumRule(view: RecordView): Finding[] {
  return view.channels('idle').flatMap(({ channel, result }): Finding[] => {
    const hum = numberIn(result.figures, 'humDbfs');
    const noise = numberIn(result.figures, 'noiseDbfs');
    const grid = numberIn(result.figures, 'mainsFrequencyHz');
    if (hum === null || noise === null || grid === null || hum < noise - HUM_UNDER_NOISE_DB) return [];
    const severity = severityOf(hum, HUM);
    if (severity === null) return [];
    return [
      makeFinding({
        code: 'mains-hum',
        severity,
        channel,
        summary: `${channelWord(channel)} hums at multiples of ${rounded(grid, 1)} Hz: ${rounded(hum, 1)} dBFS.`,
        evidence: [
          proof('hum', hum, 'dBFS'),
          proof('noise in all', noise, 'dBFS'),
          proof('mains frequency', grid, 'Hz'),
        ],
        confirmBy:
          'Run the player or the laptop from its battery, plug everything into one outlet, and turn each supply away in turn: hum that changes comes from outside the unit.',
      }),
    ];
  });
}

/** Lines at the frames of a digital link. */
export function frameNoiseRule(view: RecordView): Finding[] {
  return view.channels('idle').flatMap(({ channel, result }): Finding[] => {
    const lines = result.components.filter(({ kind }) => kind === 'frame');
    const strongest = strongestLine(lines, 'frequencyHz', 'levelDbfs');
    const severity = strongest === null ? null : severityOf(strongest.level, FRAME);
    if (strongest === null || severity === null) return [];
    return [
      makeFinding({
        code: 'frame-noise',
        severity,
        channel,
        summary: `${channelWord(channel)} lets the frames of its digital link through: a line at ${rounded(strongest.hz, 0)} Hz, ${rounded(strongest.level, 1)} dBFS.`,
        evidence: [
          proof(`line at ${rounded(strongest.hz, 0)} Hz`, strongest.level, 'dBFS'),
          proof('lines of frames', lines.length, ''),
        ],
        confirmBy:
          'Feed the unit another way (optical, network, a stick) with the same silence: a line that goes came over the cable.',
      }),
    ];
  });
}

/** Less than this above an offset of 0.01 % is nothing (common practice, no source). */
const OFFSET = { note: -66, caution: -46, fault: -32 } as const;

/** A constant voltage at the output, read with nothing played. */
export function dcOffsetRule(view: RecordView): Finding[] {
  return view.channels('idle').flatMap(({ channel, result }): Finding[] => {
    const offset = numberIn(result.figures, 'dcOffsetDbfs');
    const severity = offset === null ? null : severityOf(offset, OFFSET);
    if (offset === null || severity === null) return [];
    return [
      makeFinding({
        code: 'dc-offset',
        severity,
        channel,
        summary: `${channelWord(channel)} stands ${rounded(100 * 10 ** (offset / 20), 2)} % of full scale off zero with nothing played.`,
        evidence: [proof('constant part', offset, 'dBFS')],
        confirmBy:
          'Record with the cable unplugged at the unit: an offset that stays is the recorder’s. A voltmeter at the output tells the rest.',
      }),
    ];
  });
}

/** Nearer than this to the rig's own, a figure shows the rig. */
const RIG_DECIDES_DB = 3;

/** The recording, not the unit, sets the noise. */
export function noiseLimitedRule(view: RecordView): Finding[] {
  return view.channels('idle').flatMap(({ channel, result }): Finding[] => {
    const limit = result.limits['noiseDbfs'] as FigureLimit | undefined;
    const isRig = limit?.by === 'rig' && (limit.marginDb ?? Infinity) < RIG_DECIDES_DB;
    if (limit === undefined || (limit.by !== 'quantisation' && !isRig)) return [];
    const noise = numberIn(result.figures, 'noiseDbfs') ?? limit.below;
    return [
      makeFinding({
        code: 'recording-noise-limited',
        severity: 'note',
        channel,
        summary: `${channelWord(channel)}’s noise figures are the recording’s: its ${isRig ? 'rig' : 'word length'} is what they show.`,
        evidence: noise === null ? [] : [proof('noise', noise, 'dBFS')],
        confirmBy: 'Record with more bits and more gain at the recorder’s input, and compare.',
      }),
    ];
  });
}
