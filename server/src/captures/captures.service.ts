import { createHash } from 'node:crypto';
import { Injectable } from '@nestjs/common';
import type { AnalysisSettings, CaptureFacts } from '@benchlark/dsp';
import { DataSource, type EntityManager } from 'typeorm';
import { AuditService } from '../audit/audit.service';
import type { Actor, SignedInPerson } from '../common/actor';
import { AppError } from '../common/app-error';
import { isUniqueViolation } from '../database/database-errors';
import { AnalysisRequests } from '../jobs/analysis-requests.service';
import { PRIORITY } from '../jobs/job-queue';
import { RigSettingsService } from '../rigs/rig-settings.service';
import { ObjectStore } from '../storage/object-store';
import { enterObject, lockObject } from '../storage/stored-objects';
import { Capture, type FileWarning } from './capture.entity';
import type { UploadFieldsDto } from './dto/file-capture.dto';
import { resolveFiling } from './filing.service';
import { parseTake, type Take } from './take';
import { refreshFiling } from './refresh-filing';
import { checkUpload } from './upload/check-upload';
import type { ReceivedUpload } from './upload/capture-upload.interceptor';
import { UploadKey } from './upload-key.entity';

const FILE_NAME_LENGTH_MAX = 255;

export interface Upload {
  readonly file: ReceivedUpload;
  readonly fields: UploadFieldsDto;
  readonly person: SignedInPerson;
  /** Null or left out: the program itself, at seed time. */
  readonly actor?: Actor | null;
  readonly idempotencyKey: string | undefined;
}

interface CheckedUpload {
  readonly facts: CaptureFacts;
  readonly fileWarnings: FileWarning[];
  readonly take: Take | null;
  /** Of the first analysis. */
  readonly settings: AnalysisSettings;
}

/** Takes recordings into the archive. */
@Injectable()
export class CapturesService {
  constructor(
    private readonly dataSource: DataSource,
    private readonly store: ObjectStore,
    private readonly requests: AnalysisRequests,
    private readonly audit: AuditService,
    private readonly rigSettings: RigSettingsService,
  ) {}

  /**
   * Checks a received file, stores it, and enters row and job in one transaction.
   *
   * @returns the capture's id; with an Idempotency-Key that was used before, that of the capture made then
   * @throws AppError NOT_A_WAV, WAV_UNREADABLE, VALIDATION_FAILED, CONFLICT; nothing is kept then
   */
  async archive(upload: Upload): Promise<string> {
    const { file, fields, person, idempotencyKey } = upload;
    const fingerprint = fingerprintOf(upload);
    const known = idempotencyKey && (await this.findByKey(person.id, idempotencyKey, fingerprint));
    if (known) return known;
    const { facts, fileWarnings } = await checkUpload(file.path, file.sha256);
    // Wrong fields are found before the file is stored, so that nothing is kept for them.
    const take = fields.take === undefined ? null : parseTake(fields.take);
    const { rigId } = await resolveFiling(this.dataSource.manager, filingOf(fields));
    const settings = await this.firstSettings(take, rigId, facts);
    await this.store.keep(file.path, file.sha256);
    try {
      return await this.dataSource.transaction(async (tx) => {
        const id = await this.enter(tx, upload, { facts, fileWarnings, take, settings });
        if (idempotencyKey) {
          await tx.insert(UploadKey, {
            personId: person.id,
            key: idempotencyKey,
            fingerprint,
            captureId: id,
          });
        }
        return id;
      });
    } catch (error) {
      if (!idempotencyKey || !isUniqueViolation(error, 'pk_upload_key')) throw error;
      const made = await this.findByKey(person.id, idempotencyKey, fingerprint);
      if (!made) throw error;
      return made;
    }
  }

  private async enter(
    tx: EntityManager,
    { file, fields, person, actor = null }: Upload,
    { facts, fileWarnings, take, settings }: CheckedUpload,
  ): Promise<string> {
    const { sha256, sizeBytes } = file;
    await lockObject(tx, sha256);
    // The sweep may have come in between; it takes the same lock, so from here on the object stays.
    if ((await this.store.stat(sha256)) === null) throw new AppError('UNAVAILABLE', { retryAfterS: 1 });
    await enterObject(tx, { sha256, sizeBytes, kind: 'capture' });
    const fileName = shownName(file.fileName);
    const { identifiers } = await tx.insert(Capture, {
      ...(await resolveFiling(tx, filingOf(fields))),
      fileName,
      fileNameKey: fileName.toLowerCase(),
      sha256,
      sizeBytes,
      uploadedById: person.id,
      note: fields.note ?? '',
      sampleRateHz: facts.sampleRateHz,
      channelCount: facts.channelCount,
      bitsPerSample: facts.bitsPerSample,
      sampleFormat: facts.sampleFormat,
      frameCount: facts.frameCount,
      durationS: facts.durationS,
      fileWarnings,
      hasWarnings: fileWarnings.length > 0,
      take,
      isPractice: facts.isPractice === true || take?.isPractice === true,
    });
    const captureId = (identifiers[0] as { id: string }).id;
    await refreshFiling(tx, 'id', captureId);
    await this.requests.request(tx, {
      captureId,
      measure: take?.measure ?? null,
      settings,
      requestedById: person.id,
      priority: PRIORITY.upload,
    });
    const fact = {
      action: 'capture.stored',
      subject: `capture:${captureId}`,
      detail: `${fileName}, SHA-256 ${sha256}`,
    };
    await this.audit.record(actor, fact, tx);
    return captureId;
  }

  /** What the first analysis is given: as the take says, with what it names of the rig in full. */
  private async firstSettings(
    take: Take | null,
    rigId: string | null,
    { sampleRateHz }: CaptureFacts,
  ): Promise<AnalysisSettings> {
    if (take === null) return {};
    const { calibrationId, baselineId, ...settings } = take.settings;
    const recording = { captureId: null, rigId, sampleRateHz, takenAt: new Date(take.startedAt) };
    const ofRig = await this.rigSettings.resolve(recording, { calibrationId, baselineId });
    return { ...settings, ...ofRig.settings };
  }

  private async findByKey(personId: string, key: string, fingerprint: string): Promise<string | null> {
    const used = await this.dataSource.getRepository(UploadKey).findOneBy({ personId, key });
    if (!used) return null;
    if (used.fingerprint === fingerprint) return used.captureId;
    throw new AppError('CONFLICT', {
      reason: 'IDEMPOTENCY_KEY_REUSED',
      detail: 'This Idempotency-Key came with another upload before.',
    });
  }
}

function filingOf({ unitId, conditionId, rigId }: UploadFieldsDto) {
  return { unitId: unitId ?? null, conditionId: conditionId ?? null, rigId: rigId ?? null };
}

/** The sender's name for the file without its folders and without characters that are not to be seen. */
function shownName(name: string): string {
  const base = name.normalize('NFC').split(/[\\/]/).at(-1) ?? '';
  const visible = base
    .replace(/[\p{Cc}\p{Cf}\p{Cs}]/gu, '')
    .trim()
    .slice(0, FILE_NAME_LENGTH_MAX);
  return visible === '' || /^\.+$/.test(visible) ? 'unnamed.wav' : visible;
}

function fingerprintOf({ file, fields }: Upload): string {
  const { unitId, conditionId, rigId, note, take } = fields;
  return createHash('sha256')
    .update(
      JSON.stringify(
        [file.sha256, file.fileName, unitId, conditionId, rigId, note, take].map((part) => part ?? null),
      ),
    )
    .digest('hex');
}
