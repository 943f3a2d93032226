import type { Finding } from '../../record/record.js';
import { numberIn, pointsOf, type Point, type RecordView } from '../record-view.js';
import { channelWord, makeFinding, proof, rounded } from '../words.js';

/** Against 1 kHz, dB (common practice, no source). */
const ROLL_OFF = { note: -0.6, caution: -1.2, fault: -3 } as const;

/** A response that ends inside the audible band. */
export function rollOffRule(view: RecordView): Finding[] {
  // Many tones tell as much where there is no sweep.
  const sweeps = view.channels('sweep');
  return (sweeps.length > 0 ? sweeps : view.channels('multitone')).flatMap(({ channel, result }) =>
    (
      [
        ['levelAt20HzDb', '20 Hz', 'bass', 20],
        ['levelAt20kHzDb', '20 kHz', 'treble', 20_000],
      ] as const
    ).flatMap(([key, place, word, hz]): Finding[] => {
      const level = numberIn(result.figures, key) ?? nearestLevel(pointsOf(result, 'response'), hz);
      if (level === null || level > ROLL_OFF.note) return [];
      const corner = numberIn(result.figures, word === 'bass' ? 'minus3DbLowHz' : 'minus3DbHighHz');
      return [
        makeFinding({
          code: 'early-roll-off',
          severity: level <= ROLL_OFF.fault ? 'fault' : level <= ROLL_OFF.caution ? 'caution' : 'note',
          channel,
          summary: `${channelWord(channel)}’s ${word} falls early: ${rounded(level, 1)} dB at ${place}.`,
          evidence: [
            proof(`level at ${place}`, level, 'dB'),
            ...(corner === null ? [] : [proof('half power at', corner, 'Hz')]),
          ],
          confirmBy:
            'Measure the recorder alone through a short cable, and the unit into a higher load: a coupling capacitor or a cable moves the corner.',
        }),
      ];
    }),
  );
}

/** Level of the point next to a frequency, within a hundredth of it. */
function nearestLevel(points: readonly Point[], hz: number): number | null {
  return points.find(({ x }) => Math.abs(x / hz - 1) < 0.01)?.y ?? null;
}

/** Image below the band it mirrors, dB (common practice, no source). */
const IMAGES = { note: 50, caution: 40, fault: 20 } as const;

/** What a converter's filter leaves above half the player's rate. */
export function imageRule(view: RecordView): Finding[] {
  return view.channels('filter').flatMap(({ channel, result }): Finding[] => {
    const rejection = numberIn(result.figures, 'imageRejectionDb');
    if (rejection === null || rejection > IMAGES.note) return [];
    return [
      makeFinding({
        code: 'image-products',
        severity: rejection <= IMAGES.fault ? 'fault' : rejection <= IMAGES.caution ? 'caution' : 'note',
        channel,
        summary: `${channelWord(channel)} leaves images of the treble above half the player’s rate, only ${rounded(rejection, 0)} dB down.`,
        evidence: [proof('image rejection', rejection, 'dB')],
        confirmBy:
          'Play at twice the rate, or choose another filter where the unit offers one: the images move with the rate.',
      }),
    ];
  });
}
