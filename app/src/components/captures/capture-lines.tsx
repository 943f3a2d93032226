import { TheLine } from '@/components/line/the-line';
import type { Station } from '@/components/line/the-line';
import type { Capture } from '@/lib/api-schema';
import { formatHash, formatPercent } from '@/lib/format/quantity';

/** The three stations after the recording, for a capture that is stored. */
export function analysisStations(
  capture: Capture,
  analysis: Pick<Capture, 'state' | 'progress'> = capture,
): Station[] {
  const samples: Station = { name: 'samples', what: <code>{formatHash(capture.sha256)}</code> };
  switch (analysis.state) {
    case 'queued':
      return [samples, { name: 'dsp', what: 'waits', node: 'here', link: 'unchecked' }, record('not-yet')];
    case 'analysing':
      return [
        samples,
        {
          name: 'dsp',
          what: analysis.progress === null ? 'analysing' : `analysing, ${formatPercent(analysis.progress)}`,
          node: 'here',
          link: 'share',
          share: analysis.progress ?? 0,
        },
        record('not-yet'),
      ];
    case 'failed':
      return [
        samples,
        { name: 'dsp', what: 'failed', node: 'broken', tone: 'fault', link: 'unchecked' },
        record('not-yet'),
      ];
    case 'cancelled':
      return [
        samples,
        { name: 'dsp', what: 'cancelled', node: 'broken', link: 'unchecked' },
        record('not-yet'),
      ];
    case 'done':
      return [samples, { name: 'dsp', what: capture.record?.dspVersion ?? 'analysed' }, record('done')];
  }
}

function record(node: 'done' | 'not-yet'): Station {
  return { name: 'record', what: 'record', node, grow: 0.7 };
}

/** A capture under way, as one compact line. */
export function CaptureLine({ capture }: { capture: Capture }) {
  return (
    <TheLine
      isCompact
      label={`Where capture ${capture.number} is`}
      stations={[{ name: 'recording', what: 'all sent' }, ...analysisStations(capture)]}
    />
  );
}
