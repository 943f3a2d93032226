import { formatDuration } from '@/lib/format/quantity';
import { channelName } from '@/lib/capture-words';
import './waveform.css';

const WIDTH = 1000;
const LANE = 64;

/** Least and greatest value of each bin, channel by channel; full scale is 1. */
export interface WaveformOverview {
  readonly channels: readonly { readonly min: readonly number[]; readonly max: readonly number[] }[];
}

export interface WaveformDrawingProps {
  overview: WaveformOverview;
  durationS: number;
  channels: readonly string[];
  /** A part that is marked, seconds. */
  segment: { fromS: number; toS: number } | null;
}

/** A whole recording or stimulus at a glance. */
export function WaveformDrawing({ overview, durationS, channels, segment }: WaveformDrawingProps) {
  const height = LANE * overview.channels.length;
  const toX = (seconds: number) => (seconds / durationS) * WIDTH;
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
        aria-label={waveformWords(overview, durationS, segment)}
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
        <span>{formatDuration(durationS)}</span>
      </p>
    </div>
  );
}

/** The greatest and the least of each bin as one outline; full scale fills the lane. */
function envelope({ min, max }: WaveformOverview['channels'][number]): string {
  const count = max.length;
  const x = (n: number) => ((n / Math.max(1, count - 1)) * WIDTH).toFixed(1);
  const y = (value: number) => (LANE / 2 - Math.max(-1, Math.min(1, value)) * (LANE / 2 - 2)).toFixed(1);
  const upper = max.map((value, n) => `${n === 0 ? 'M' : 'L'}${x(n)} ${y(value)}`);
  const lower = min.map((value, n) => `L${x(n)} ${y(value)}`).reverse();
  return `${upper.join('')}${lower.join('')}Z`;
}

function waveformWords(
  overview: WaveformOverview,
  durationS: number,
  segment: WaveformDrawingProps['segment'],
): string {
  const peaks = overview.channels.map(({ min, max }) => Math.max(...max.map(Math.abs), ...min.map(Math.abs)));
  const peakWords = peaks.map((peak) => `${Math.round(peak * 100)} %`).join(' and ');
  const part = segment
    ? ` Measured from ${formatDuration(segment.fromS)} to ${formatDuration(segment.toS)}.`
    : '';
  return `Waveform of ${formatDuration(durationS)}; peaks at ${peakWords} of full scale.${part}`;
}
