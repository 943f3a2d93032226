import type { Finding } from '../record/record.js';

const CHANNEL_WORDS: Readonly<Record<string, string>> = { left: 'Left', right: 'Right' };

/** A channel at the beginning of a sentence. */
export function channelWord(channel: string): string {
  return CHANNEL_WORDS[channel] ?? `Channel ${channel.replace(/^ch/, '')}`;
}

/** A number for a sentence. */
export function rounded(value: number, digits: number): string {
  const text = value.toFixed(digits);
  return Number(text) === 0 ? (0).toFixed(digits) : text;
}

/** A piece of evidence. */
export function proof(figure: string, value: number, unit: string): Finding['evidence'][number] {
  return { figure, value, unit };
}

/** A finding with what most of them leave empty. */
export function makeFinding(
  finding: Pick<Finding, 'code' | 'severity' | 'channel' | 'summary' | 'evidence' | 'confirmBy'> &
    Partial<Pick<Finding, 'half' | 'fromStimulusDbfs'>>,
): Finding {
  const {
    code,
    severity,
    channel,
    half = null,
    fromStimulusDbfs = null,
    summary,
    evidence,
    confirmBy,
  } = finding;
  return { code, severity, channel, half, fromStimulusDbfs, summary, evidence, confirmBy };
}
