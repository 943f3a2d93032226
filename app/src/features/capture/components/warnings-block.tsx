import { MarginBlock, WarningBlock } from '@/components/page/page';
import type { Capture } from '@/lib/api-schema';
import { channelName } from '@/lib/capture-words';
import { describeFigure } from '@/lib/figures';
import type { ServedBody } from '../api/record-queries';

/** What to know before a figure is used, in plain words. */
export function WarningsBlock({ capture, record }: { capture: Capture; record: ServedBody | null }) {
  const warnings = record?.warnings ?? [];
  // The record repeats what the file itself gave rise to; it is said once.
  const ofFile = capture.fileWarnings.filter(
    ({ code }) => !warnings.some((warning) => warning.code === code),
  );
  if (warnings.length === 0 && ofFile.length === 0) {
    if (!record) return null; // nothing was looked at yet, so nothing can be said
    return (
      <MarginBlock title="Warnings">
        <p className="bl-ink-2">None.</p>
      </MarginBlock>
    );
  }
  return (
    <MarginBlock title="Warnings">
      {ofFile.map(({ code, message }) => (
        <WarningBlock key={code} lead="The file.">
          {message}
        </WarningBlock>
      ))}
      {warnings.map(({ code, channel, figures, message }, index) => (
        <WarningBlock key={`${code}-${index}`} lead={leadOf(channel, figures)}>
          {message}
        </WarningBlock>
      ))}
    </MarginBlock>
  );
}

/** "Left: SNR, noise." The figures it is about come first, as a reader looks for them. */
function leadOf(channel: string | null, figures: readonly string[]): string {
  const labels = [...new Set(figures.map((key) => describeFigure(key).label))];
  const named = labels.length > 3 ? `${labels.slice(0, 3).join(', ')} and others` : labels.join(', ');
  const where = channel === null ? '' : capitalise(channelName(channel));
  if (where === '') return named === '' ? 'The recording.' : `${named}.`;
  return named === '' ? `${where}.` : `${where}: ${named}.`;
}

function capitalise(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
