import type { Finding } from '../../record/record.js';
import type { RecordView } from '../record-view.js';
import { channelWord, makeFinding, proof } from '../words.js';

/** The recorder ran out of range: what it shows then is its own. */
export function overloadRule(view: RecordView): Finding[] {
  const warnings = [view.record, ...view.record.segments]
    .flatMap((body) => body.warnings)
    .filter(({ code }) => code === 'recording-overloaded');
  const channels = [...new Set(warnings.map(({ channel }) => channel))];
  return channels.map((channel) =>
    makeFinding({
      code: 'recording-overloaded',
      severity: 'caution',
      channel,
      summary: `${channel === null ? 'The recording' : channelWord(channel)} is clipped by the recorder itself: nothing can be said of the unit at these levels.`,
      evidence: [
        proof(
          'measures in which it shows',
          warnings.filter((warning) => warning.channel === channel).length,
          '',
        ),
      ],
      confirmBy: 'Lower the recorder’s input gain by 6 dB and record again.',
    }),
  );
}
