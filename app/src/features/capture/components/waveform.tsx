import { useQuery } from '@tanstack/react-query';
import { Section } from '@/components/page/page';
import { FailedState, LoadingState } from '@/components/states/states';
import { WaveformDrawing } from '@/components/waveform/waveform-drawing';
import type { Capture } from '@/lib/api-schema';
import { errorWords } from '@/lib/error-words';
import { formatDuration } from '@/lib/format/quantity';
import { captureQueries } from '@/lib/queries/captures';

export interface WaveformProps {
  capture: Capture;
  channels: readonly string[];
  /** The part that was measured, seconds. */
  segment: { fromS: number; toS: number } | null;
}

/** The whole recording at a glance, the measured part marked. */
export function Waveform({ capture, channels, segment }: WaveformProps) {
  const overview = useQuery(captureQueries.overview(capture.id));
  const sub = segment
    ? `${formatDuration(capture.durationS)}, measured from ${formatDuration(segment.fromS)} to ${formatDuration(segment.toS)}`
    : formatDuration(capture.durationS);
  return (
    <Section title="The recording" sub={sub}>
      {overview.isPending && <LoadingState what="Fetching the overview" />}
      {overview.isError && (
        <FailedState
          what="The overview could not be fetched."
          why={errorWords(overview.error)}
          onRetry={() => void overview.refetch()}
        />
      )}
      {overview.data && (
        <WaveformDrawing
          overview={overview.data}
          durationS={capture.durationS}
          channels={channels}
          segment={segment}
        />
      )}
    </Section>
  );
}
