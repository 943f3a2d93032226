import { createHash } from 'node:crypto';
import { Readable } from 'node:stream';
import { toRecordJson, type BenchRecord, type Trace } from '@benchlark/dsp';
import type { DataSource, EntityManager } from 'typeorm';
import { encodeTrace, mapTraces, type TracePlace, type TraceReference } from '../records/stored-record';
import { BenchRecordRow } from '../records/record.entity';
import { RecordFigure } from '../records/record-figure.entity';
import { RecordTrace } from '../records/record-trace.entity';
import type { ObjectStore } from '../storage/object-store';
import { enterObject, lockObject } from '../storage/stored-objects';
import type { AnalysisJob } from './analysis-job.entity';
import type { AnalysisOutcome } from './analysis-thread-messages';
import { announce } from './job-queue';
import { lockAttempt } from './job-progress';
import { figureRows, mainFigureOf, sketchOf } from './record-facts';

interface KeptTraces {
  readonly content: BenchRecord;
  readonly places: readonly (TracePlace & TraceReference)[];
}

/** Stores the bytes of every trace and puts references in their place. */
async function keepTraces(store: ObjectStore, record: BenchRecord): Promise<KeptTraces> {
  const places: (TracePlace & TraceReference)[] = [];
  const bytesBySha = new Map<string, Buffer>();
  const referenced = mapTraces<Trace, TraceReference>(record, (trace, place) => {
    const bytes = encodeTrace(trace);
    const sha256 = createHash('sha256').update(bytes).digest('hex');
    bytesBySha.set(sha256, bytes);
    const reference = { sha256, points: trace.x.length, xUnit: trace.xUnit, yUnit: trace.yUnit };
    places.push({ ...place, ...reference });
    return reference;
  });
  for (const bytes of bytesBySha.values()) await store.put(Readable.from([bytes]));
  // References pass for traces here: with full detail they are taken over as they are.
  return { content: toRecordJson(referenced as unknown as BenchRecord, { traces: 'full' }), places };
}

/**
 * Enters a record with its figures and traces, makes it the capture's current one and ends the job, all or nothing.
 *
 * @returns the record's id, or null when this attempt may no longer write: it was cancelled, or another took over
 */
export async function storeRecord(
  { dataSource, store }: { dataSource: DataSource; store: ObjectStore },
  job: AnalysisJob,
  { record, overview, recognisedAs }: AnalysisOutcome,
): Promise<string | null> {
  const { content, places } = await keepTraces(store, record);
  return dataSource.transaction(async (tx) => {
    if (!(await lockAttempt(tx, job))) return null;
    // Records of one capture follow one another: the capture's row is the lock.
    await tx.query('SELECT 1 FROM capture WHERE id = $1 FOR UPDATE', [job.captureId]);
    await enterTraces(tx, places);
    const recordId = await enterRecord(tx, job, content, { record, recognisedAs });
    await tx.insert(RecordFigure, figureRows(recordId, content));
    if (places.length > 0)
      await tx.insert(
        RecordTrace,
        places.map((place) => ({ recordId, ...place })),
      );
    await tx.query(
      `INSERT INTO capture_overview (sha256, content) SELECT sha256, $2 FROM capture WHERE id = $1
       ON CONFLICT (sha256) DO NOTHING`,
      [job.captureId, JSON.stringify(overview)],
    );
    await tx.query(
      `UPDATE capture SET record_id = $2, measure = $3, state = 'done',
         has_warnings = ($4 > 0 OR json_array_length(file_warnings) > 0) WHERE id = $1`,
      [job.captureId, recordId, content.measure, content.warnings.length],
    );
    await tx.query(
      `UPDATE analysis_job SET state = 'done', progress = 1, ended_at = now(), failure_code = NULL,
         failure_message = NULL WHERE id = $1`,
      [job.id],
    );
    await announce(tx, { captureId: job.captureId, state: 'done', progress: null, recordId });
    return recordId;
  });
}

async function enterTraces(tx: EntityManager, places: readonly TraceReference[]): Promise<void> {
  const sizes = new Map(places.map(({ sha256, points }) => [sha256, points * 16]));
  // Always in the same order, so that two workers never wait for each other.
  for (const sha256 of [...sizes.keys()].sort()) {
    await lockObject(tx, sha256);
    await enterObject(tx, { sha256, sizeBytes: sizes.get(sha256) ?? 0, kind: 'trace' });
  }
}

async function enterRecord(
  tx: EntityManager,
  job: AnalysisJob,
  content: BenchRecord,
  { record, recognisedAs }: Pick<AnalysisOutcome, 'record' | 'recognisedAs'>,
): Promise<string> {
  const [last] = await tx.query<{ id: string; ordinal: number }[]>(
    'SELECT id, ordinal FROM record WHERE capture_id = $1 ORDER BY ordinal DESC LIMIT 1',
    [job.captureId],
  );
  const first = content.channels[0]?.figures ?? {};
  const numberOrNull = (value: unknown) => (typeof value === 'number' ? value : null);
  const { identifiers } = await tx.insert(BenchRecordRow, {
    captureId: job.captureId,
    jobId: job.id,
    ordinal: (last?.ordinal ?? 0) + 1,
    measure: content.measure,
    dspVersion: content.dspVersion,
    settings: job.settings,
    content,
    supersedesId: last?.id ?? null,
    mainFigure: mainFigureOf(content),
    sketch: sketchOf(record),
    warningCount: content.warnings.length,
    recognisedAs,
    stimulusName: content.stimulus?.name ?? null,
    fundamentalFrequencyHz: numberOrNull(first['fundamentalFrequencyHz']),
    fundamentalLevelDbfs: numberOrNull(first['fundamentalLevelDbfs']),
  });
  return (identifiers[0] as { id: string }).id;
}
