import { buffer } from 'node:stream/consumers';
import { Injectable } from '@nestjs/common';
import type { AnalysisSettings, BenchRecord, Trace } from '@benchlark/dsp';
import { DataSource } from 'typeorm';
import { AuditService } from '../audit/audit.service';
import type { Actor, SignedInPerson } from '../common/actor';
import { AppError } from '../common/app-error';
import { Capture } from '../captures/capture.entity';
import { recordedWith } from '../captures/recorded-with';
import { AnalysisRequests } from '../jobs/analysis-requests.service';
import { PRIORITY } from '../jobs/job-queue';
import { RigSettingsService } from '../rigs/rig-settings.service';
import { EvidenceService } from '../storage/evidence.service';
import { ObjectStore } from '../storage/object-store';
import type { RecordDto } from './dto/record.dto';
import type { RecordSummaryDto } from './dto/record-summary.dto';
import type { RequestedRecordDto, RequestRecordDto } from './dto/request-record.dto';
import { SUMMARY_SELECT, toRecordSummary, type SummaryRow } from './record-summary';
import { RecordTrace } from './record-trace.entity';
import { decodeTrace, mapTraces, type StoredRecord, type TraceReference } from './stored-record';

interface RecordRow extends SummaryRow {
  captureId: string;
  captureNumber: number;
  content: StoredRecord;
  settings: AnalysisSettings;
}

/** Records: each one analysis of one capture, never changed. */
@Injectable()
export class RecordsService {
  constructor(
    private readonly dataSource: DataSource,
    private readonly requests: AnalysisRequests,
    private readonly evidence: EvidenceService,
    private readonly store: ObjectStore,
    private readonly audit: AuditService,
    private readonly rigSettings: RigSettingsService,
  ) {}

  /** The records of a capture, newest first. */
  async listOf(captureId: string): Promise<RecordSummaryDto[]> {
    await this.ensureCapture(captureId);
    const rows = await this.dataSource.query<SummaryRow[]>(
      `SELECT ${SUMMARY_SELECT} FROM record AS r WHERE r.capture_id = $1 ORDER BY r.ordinal DESC`,
      [captureId],
    );
    return rows.map(toRecordSummary);
  }

  /** Asks for another analysis of a capture; the record it gives supersedes the current one. */
  async request(
    captureId: string,
    wanted: RequestRecordDto,
    actor: Actor & { person: SignedInPerson },
  ): Promise<RequestedRecordDto> {
    const { measure = null, calibrationId, baselineId, ...given } = wanted;
    const { fromS, toS, bandLowHz, bandHighHz } = given;
    if (fromS !== undefined && toS !== undefined && fromS >= toS) refuse('toS', 'must come after fromS');
    if (bandLowHz !== undefined && bandHighHz !== undefined && bandLowHz >= bandHighHz) {
      refuse('bandHighHz', 'must lie above bandLowHz');
    }
    const capture = await this.dataSource.getRepository(Capture).findOneBy({ id: captureId });
    if (!capture) throw new AppError('NOT_FOUND');
    if (fromS !== undefined && fromS >= capture.durationS)
      refuse('fromS', 'lies beyond the end of the recording');
    const asGiven = Object.fromEntries(Object.entries(given).filter(([, value]) => value !== undefined));
    return this.dataSource.transaction(async (tx) => {
      const ofRig = await this.rigSettings.resolve(recordedWith(capture), { calibrationId, baselineId }, tx);
      const asked = {
        captureId,
        measure,
        settings: { ...asGiven, ...ofRig.settings },
        requestedById: actor.person.id,
        priority: PRIORITY.onDemand,
      };
      const requested = await this.requests.request(tx, asked);
      const fact = {
        action: 'analysis.requested',
        subject: `capture:${captureId}`,
        detail: JSON.stringify(wanted),
      };
      if (requested.isNew) await this.audit.record(actor, fact, tx);
      return { ...requested, notes: ofRig.notes };
    });
  }

  async get(id: string): Promise<RecordDto> {
    const row = await this.row(id);
    return {
      ...toRecordSummary(row),
      captureId: row.captureId,
      isCurrent: row.supersededById === null,
      record: mapTraces<TraceReference, object>(row.content, ({ sha256, ...trace }) => ({
        href: `/api/records/${id}/traces/${sha256}`,
        ...trace,
      })) as unknown as Record<string, unknown>,
    };
  }

  /** The row with its content. @throws AppError NOT_FOUND */
  async row(id: string): Promise<RecordRow> {
    const rows = await this.dataSource.query<RecordRow[]>(
      `SELECT ${SUMMARY_SELECT}, r.capture_id AS "captureId", c.number AS "captureNumber", r.content, r.settings
       FROM record AS r JOIN capture AS c ON c.id = r.capture_id WHERE r.id = $1`,
      [id],
    );
    const [row] = rows;
    if (!row) throw new AppError('NOT_FOUND');
    return row;
  }

  /** Lets a trace through only by a record that has it, and only sound. @throws AppError NOT_FOUND, EVIDENCE_… */
  async trace(id: string, sha256: string): Promise<{ sha256: string; sizeBytes: number }> {
    const trace = await this.dataSource.getRepository(RecordTrace).findOneBy({ recordId: id, sha256 });
    if (!trace) throw new AppError('NOT_FOUND');
    await this.evidence.ensureSound(sha256);
    return { sha256, sizeBytes: trace.points * 16 };
  }

  /** The record as the contract has it, with every trace in full. */
  async withTraces({ content }: Pick<RecordRow, 'content'>): Promise<BenchRecord> {
    const traces = new Map<string, { x: Float64Array; y: Float64Array }>();
    const wanted = new Set<string>();
    mapTraces<TraceReference, void>(content, ({ sha256 }) => void wanted.add(sha256));
    for (const sha256 of wanted) {
      await this.evidence.ensureSound(sha256);
      traces.set(sha256, decodeTrace(await buffer(await this.store.read(sha256))));
    }
    return mapTraces<TraceReference, Trace>(content, ({ sha256, xUnit, yUnit }) => {
      const { x, y } = traces.get(sha256) ?? { x: [], y: [] };
      return { xUnit, yUnit, x, y };
    }) as BenchRecord; // the stored content is a record but for its traces
  }

  private async ensureCapture(id: string): Promise<void> {
    if (!(await this.dataSource.getRepository(Capture).existsBy({ id }))) throw new AppError('NOT_FOUND');
  }
}

function refuse(field: string, message: string): never {
  throw new AppError('VALIDATION_FAILED', { fields: { [field]: [message] } });
}
