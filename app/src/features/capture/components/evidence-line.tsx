import { TheLine } from '@/components/line/the-line';
import type { Station } from '@/components/line/the-line';
import type { Capture, RecordSummary } from '@/lib/api-schema';
import { STATE_WORDS } from '@/lib/capture-words';
import { formatDateTime } from '@/lib/format/date';
import { formatDuration, formatHash, formatPercent } from '@/lib/format/quantity';

export interface EvidenceLineProps {
  capture: Capture;
  /** The record that is shown, not necessarily the newest. */
  record: Pick<RecordSummary, 'ordinal' | 'dspVersion' | 'supersededById'> | null;
}

/** The evidence line: from the recording over its bytes and the program to the record and, one day, a review. */
export function EvidenceLine({ capture, record }: EvidenceLineProps) {
  return (
    <TheLine
      label="The evidence"
      stations={[
        recordingStation(capture),
        samplesStation(capture),
        ...analysisStations(capture, record),
        REVIEW,
      ]}
      now={nowWords(capture, record)}
    />
  );
}

const REVIEW: Station = {
  name: 'review',
  what: 'not yet',
  more: 'no review quotes it',
  node: 'not-yet',
  grow: 0.7,
};

function recordingStation(capture: Capture): Station {
  const by = [capture.rig?.name, capture.uploadedBy.displayName].filter(Boolean).join(', ');
  return {
    name: 'recording',
    what: formatDateTime(capture.uploadedAt),
    more: `${by}, ${formatDuration(capture.durationS)}`,
    link: capture.evidence === 'sound' ? 'checked' : 'cut',
  };
}

function samplesStation(capture: Capture): Station {
  const what = <code>{formatHash(capture.sha256)}</code>;
  switch (capture.evidence) {
    case 'sound':
      return {
        name: 'samples',
        what,
        more: capture.checkedAt
          ? `SHA-256, checked ${formatDateTime(capture.checkedAt)}`
          : 'SHA-256, as it arrived',
      };
    case 'damaged':
      return {
        name: 'samples',
        what: 'the bytes differ',
        more: 'from those that were measured',
        node: 'broken',
        tone: 'fault',
      };
    case 'missing':
      return {
        name: 'samples',
        what: 'the bytes are gone',
        more: 'from the store',
        node: 'broken',
        tone: 'fault',
      };
  }
}

function analysisStations(capture: Capture, record: EvidenceLineProps['record']): Station[] {
  const isRunning = capture.state === 'queued' || capture.state === 'analysing';
  if (!record) {
    if (isRunning) {
      return [runningStation(capture), { name: 'record', what: 'not yet', node: 'not-yet' }];
    }
    return [
      { name: 'dsp', what: STATE_WORDS[capture.state], node: 'broken', tone: 'fault', link: 'unchecked' },
      { name: 'record', what: 'none', node: 'not-yet' },
    ];
  }
  const isSuperseded = record.supersededById !== null;
  return [
    {
      name: 'dsp',
      what: `version ${record.dspVersion}`,
      more: isRunning ? runningWords(capture) : undefined,
    },
    {
      name: 'record',
      what: `record ${record.ordinal}, ${isSuperseded ? 'superseded' : 'current'}`,
      more: isSuperseded ? 'a newer one stands in its place' : undefined,
      node: 'here',
      link: isSuperseded ? 'cut' : 'unchecked',
    },
  ];
}

function runningStation(capture: Capture): Station {
  if (capture.state === 'queued')
    return { name: 'dsp', what: STATE_WORDS.queued, node: 'here', link: 'unchecked' };
  return {
    name: 'dsp',
    what: STATE_WORDS.analysing,
    more: capture.progress === null ? undefined : formatPercent(capture.progress),
    node: 'here',
    link: 'share',
    share: capture.progress ?? 0,
  };
}

function runningWords(capture: Capture): string {
  if (capture.state === 'queued') return 'another analysis waits';
  return capture.progress === null
    ? 'another analysis runs'
    : `another analysis, ${formatPercent(capture.progress)}`;
}

function nowWords(capture: Capture, record: EvidenceLineProps['record']): string {
  const bytes = { sound: 'Bytes unchanged', damaged: 'The bytes differ', missing: 'The bytes are gone' }[
    capture.evidence
  ];
  const state = record
    ? `Record ${record.ordinal}, ${record.supersededById ? 'superseded' : 'current'}`
    : `No record: ${STATE_WORDS[capture.state]}`;
  return `${state}. Arrived ${formatDateTime(capture.uploadedAt)}. ${bytes}.`;
}
