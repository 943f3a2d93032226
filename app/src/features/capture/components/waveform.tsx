import { useQuery } from '@tanstack/react-query';
import { Section } from '@/components/page/page';
import { FailedState, LoadingState } from '@/components/states/states';
import type { Capture, Overview } from '@/lib/api-schema';
import { errorWords } from '@/lib/error-words';
import { formatDuration } from '@/lib/format/quantity';
import { channelName } from '@/lib/capture-words';
import { captureQueries } from '@/lib/queries/captures';

const WIDTH = 1000;
const LANE = 64;

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
        <WaveformDrawing overview={overview.data} capture={capture} channels={channels} segment={segment} />
      )}
    </Section>
  );
}

function WaveformDrawing({ overview, capture, channels, segment }: WaveformProps & { overview: Overview }) {
  const height = LANE * overview.channels.length;
  const toX = (seconds: number) => (seconds / capture.durationS) * WIDTH;
  return (
    <div className="bl-waveform">
      <ul
        className="bl-waveform-names"
        style={{ gridTemplateRows: `repeat(${overview.channels.length}, ${LANE}px)` }}
      >
        {overview.channels.map((_, index) => (
          <li key={index}>{channelName(channels[index] ?? `ch${index + 1}`)}</li>
        ))}
      </ul>
      <svg
        viewBox={`0 0 ${WIDTH} ${height}`}
        height={height}
        preserveAspectRatio="none"
        role="img"
        aria-label={waveformWords(overview, capture, segment)}
      >
        <rect className="bl-waveform-plot" width={WIDTH} height={height} />
        {segment && (
          <rect
            className="bl-waveform-segment"
            x={toX(segment.fromS)}
            width={Math.max(1, toX(segment.toS) - toX(segment.fromS))}
            height={height}
          />
        )}
        {overview.channels.map((channel, index) => (
          <g
            key={index}
            className={`bl-waveform-lane bl-waveform-${(index % 6) + 1}`}
            transform={`translate(0 ${index * LANE})`}
          >
            <path className="bl-waveform-zero" d={`M0 ${LANE / 2}H${WIDTH}`} />
            <path d={envelope(channel)} />
          </g>
        ))}
        <rect className="bl-waveform-frame" width={WIDTH} height={height} />
      </svg>
      <p className="bl-waveform-scale">
        <span>0 s</span>
        <span>{formatDuration(capture.durationS)}</span>
      </p>
    </div>
  );
}

/** The greatest and the least of each bin as one outline; full scale fills the lane. */
function envelope({ min, max }: Overview['channels'][number]): string {
  const count = max.length;
  const x = (n: number) => ((n / Math.max(1, count - 1)) * WIDTH).toFixed(1);
  const y = (value: number) => (LANE / 2 - Math.max(-1, Math.min(1, value)) * (LANE / 2 - 2)).toFixed(1);
  const upper = max.map((value, n) => `${n === 0 ? 'M' : 'L'}${x(n)} ${y(value)}`);
  const lower = min.map((value, n) => `L${x(n)} ${y(value)}`).reverse();
  return `${upper.join('')}${lower.join('')}Z`;
}

function waveformWords(overview: Overview, capture: Capture, segment: WaveformProps['segment']): string {
  const peaks = overview.channels.map(({ min, max }) => Math.max(...max.map(Math.abs), ...min.map(Math.abs)));
  const peakWords = peaks.map((peak) => `${Math.round(peak * 100)} %`).join(' and ');
  const part = segment
    ? ` Measured from ${formatDuration(segment.fromS)} to ${formatDuration(segment.toS)}.`
    : '';
  return `Waveform of ${formatDuration(capture.durationS)}; peaks at ${peakWords} of full scale.${part}`;
}
