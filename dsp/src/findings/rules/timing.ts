import type { Finding } from '../../record/record.js';
import { numberIn, strongestLine, type RecordView } from '../record-view.js';
import { channelWord, makeFinding, proof, rounded } from '../words.js';

/** Peak to peak, ps (common practice, no source): 500 ps put sidebands at -100 dB beside 12 kHz. */
const JITTER_PS = { note: 150, caution: 500, fault: 4000 } as const;

/** A clock that is moved at some frequency. */
export function jitterRule(view: RecordView): Finding[] {
  return view.channels('jitter').flatMap(({ channel, result }): Finding[] => {
    const ps = numberIn(result.figures, 'jitterPeakToPeakPs');
    if (ps === null || ps < JITTER_PS.note) return [];
    const moving = result.components.filter(({ kind }) => kind !== 'amplitude');
    const pair = strongestLine(moving, 'offsetHz', 'levelDbr');
    return [
      makeFinding({
        code: 'jitter',
        severity: ps >= JITTER_PS.fault ? 'fault' : ps >= JITTER_PS.caution ? 'caution' : 'note',
        channel,
        summary: `${channelWord(channel)}’s clock moves by ${rounded(ps, 0)} ps peak to peak${pair === null ? '' : `, most of it at ${rounded(pair.hz, 0)} Hz`}.`,
        evidence: [
          proof('jitter, peak to peak', ps, 'ps'),
          ...(pair === null ? [] : [proof(`sidebands at ${rounded(pair.hz, 0)} Hz`, pair.level, 'dBr')]),
        ],
        confirmBy:
          'Measure a tone of half the frequency: jitter’s sidebands fall by 6 dB, amplitude modulation’s stay. Feed the unit from another source to tell its clock from the link’s.',
      }),
    ];
  });
}

/** Level lost by a wave between its samples, dB (common practice, no source). */
const LEAST_LOSS_DB = 0.1;
const FAULTY_LOSS_DB = 0.5;
const LOUD_HARMONICS_DB = -50;

/** A converter without room for what lies between the samples. */
export function intersampleRule(view: RecordView): Finding[] {
  return view.channels('intersample').flatMap(({ channel, result }): Finding[] => {
    const loss = numberIn(result.figures, 'levelErrorDb');
    const thd = numberIn(result.figures, 'thdDb');
    if (view.isOverloaded(channel, ['intersample'])) return [];
    const isLost = loss !== null && loss < -LEAST_LOSS_DB;
    const isBent = thd !== null && thd > LOUD_HARMONICS_DB;
    if (!isLost && !isBent) return [];
    return [
      makeFinding({
        code: 'intersample-overload',
        severity: loss !== null && loss < -FAULTY_LOSS_DB ? 'fault' : 'caution',
        channel,
        summary: `${channelWord(channel)} has no room for waves that go beyond their samples: it ${
          isLost ? `loses ${rounded(-loss, 2)} dB of` : `adds ${rounded(thd ?? 0, 0)} dB of harmonics to`
        } a tone 3 dB above full scale.`,
        evidence: [
          ...(loss === null ? [] : [proof('level error', loss, 'dB')]),
          ...(thd === null ? [] : [proof('THD', thd, 'dB')]),
        ],
        confirmBy:
          'Play the same file 4 dB lower in the player: the loss goes if it is the converter’s headroom.',
      }),
    ];
  });
}
