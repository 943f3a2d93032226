import type { Finding } from '../../record/record.js';
import { numberIn, type RecordView } from '../record-view.js';
import { channelWord, makeFinding, proof, rounded } from '../words.js';

const CONFIRM_CABLES =
  'Swap the two cables at the recorder and measure again: what moves with them is the cabling or the recorder.';

/** Polarity of the whole chain, from the sweep or the marks. */
export function polarityRule(view: RecordView): Finding[] {
  const finding = (summary: string, figure: string): Finding =>
    makeFinding({
      code: 'inverted-polarity',
      severity: 'caution',
      channel: null,
      summary,
      evidence: [proof(figure, -1, '')],
      confirmBy: `Measure the recorder alone through a cable: it may be the one that inverts. ${CONFIRM_CABLES}`,
    });
  const one = view
    .bodies('separation')
    .some(({ between }) => between.figures['interchannelPolarity'] === 'inverted');
  if (one) return [finding('One channel is inverted against the other.', 'phase between the channels')];
  const stimulus = view.record.stimulus ?? view.bodies('sweep').at(0)?.stimulus ?? null;
  return stimulus?.polarity === 'inverted'
    ? [
        finding(
          'The chain inverts: what goes up in the file comes down in the recording.',
          'phase at the output',
        ),
      ]
    : [];
}

/** Left and right exchanged, or running together. */
export function wiringRule(view: RecordView): Finding[] {
  return view.bodies('separation').flatMap((body): Finding[] => {
    const [toRight, toLeft] = ['separationLeftToRightAt1kHzDb', 'separationRightToLeftAt1kHzDb'].map((key) =>
      numberIn(body.between.figures, key),
    );
    const evidence = [
      ...(toRight === null ? [] : [proof('separation, left to right', toRight, 'dB')]),
      ...(toLeft === null ? [] : [proof('separation, right to left', toLeft, 'dB')]),
    ];
    if (body.warnings.some(({ code }) => code === 'channels-swapped')) {
      return [
        makeFinding({
          code: 'swapped-channels',
          severity: 'fault',
          channel: null,
          summary: 'Left and right are exchanged somewhere between player and recorder.',
          evidence,
          confirmBy: CONFIRM_CABLES,
        }),
      ];
    }
    const least = Math.min(toRight ?? Infinity, toLeft ?? Infinity);
    if (least > JOINED_DB.caution) return [];
    return [
      makeFinding({
        code: 'joined-channels',
        severity: least <= JOINED_DB.fault ? 'fault' : 'caution',
        channel: null,
        summary: `The channels run together: only ${rounded(least, 1)} dB lie between them at 1 kHz.`,
        evidence,
        confirmBy: `Look for a mono switch or a combined output, and try another source. ${CONFIRM_CABLES}`,
      }),
    ];
  });
}

/** Between channels at 1 kHz (common practice, no source). */
const JOINED_DB = { caution: 25, fault: 10 } as const;
/** Right less left at 1 kHz (common practice, no source). */
const BALANCE_DB = { note: 0.25, caution: 0.5, fault: 1.5 } as const;

/** One channel louder than the other. */
export function balanceRule(view: RecordView): Finding[] {
  return view.bodies('separation').flatMap(({ between, warnings }): Finding[] => {
    // Of exchanged channels each turn's own channel holds next to nothing.
    if (warnings.some(({ code }) => code === 'channels-swapped')) return [];
    const balance = numberIn(between.figures, 'balanceDb');
    if (balance === null || Math.abs(balance) < BALANCE_DB.note || Math.abs(balance) > 40) return [];
    const size = Math.abs(balance);
    const weaker = balance < 0 ? 'right' : 'left';
    return [
      makeFinding({
        code: 'channel-imbalance',
        severity: size >= BALANCE_DB.fault ? 'fault' : size >= BALANCE_DB.caution ? 'caution' : 'note',
        channel: weaker,
        summary: `${channelWord(weaker)} is ${rounded(size, 2)} dB weaker than its neighbour.`,
        evidence: [proof('balance, right less left', balance, 'dB')],
        confirmBy: CONFIRM_CABLES,
      }),
    ];
  });
}
