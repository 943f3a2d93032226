import { Injectable } from '@nestjs/common';
import { embedBaseline, type AnalysisSettings, type BenchRecord } from '@benchlark/dsp';
import { DataSource, IsNull, type EntityManager } from 'typeorm';
import { AppError } from '../common/app-error';
import { BenchRecordRow } from '../records/record.entity';
import { calibrationState, dayOf } from './calibration-state';
import type { LiveBaselineDto, LiveCalibrationDto, LiveSettingsDto } from './dto/live-settings.dto';
import { embedCalibration, isFollowedBy, isSameSetting, type EmbeddedCalibration } from './embed-calibration';
import { RigBaseline } from './rig-baseline.entity';
import { RigCalibration } from './rig-calibration.entity';
import { Rig } from './rig.entity';

/** What a request names of the rig. */
export interface RigChoice {
  readonly calibrationId?: string | null;
  readonly baselineId?: string | null;
}

/** The recording that is analysed, as far as it must fit what is named. */
export interface RecordedWith {
  /** Null: not stored yet. */
  readonly captureId: string | null;
  readonly rigId: string | null;
  readonly sampleRateHz: number;
  readonly takenAt: Date;
}

export interface ResolvedSettings {
  readonly settings: Pick<AnalysisSettings, 'calibration' | 'baseline'>;
  /** What was accepted although it doesn't fit, in sentences. */
  readonly notes: readonly string[];
}

/** Turns what is named of a rig into what settings embed. */
@Injectable()
export class RigSettingsService {
  constructor(private readonly dataSource: DataSource) {}

  /**
   * Looks up the calibration and baseline that a request names and gives them in full.
   *
   * @throws AppError VALIDATION_FAILED naming `calibrationId` or `baselineId`: unknown, retired, or another rig's
   */
  async resolve(
    recording: RecordedWith,
    { calibrationId, baselineId }: RigChoice,
    tx: EntityManager = this.dataSource.manager,
  ): Promise<ResolvedSettings> {
    const notes: string[] = [];
    let calibration: EmbeddedCalibration | undefined;
    let baseline: BenchRecord | undefined;
    if (calibrationId) {
      const row = await tx.findOneBy(RigCalibration, { id: calibrationId });
      if (!row) return refuse('calibrationId', 'is not a known calibration');
      checkOwner('calibrationId', row, recording.rigId);
      if (row.direction === 'output') {
        refuse('calibrationId', 'is one of an output: what was recorded is read by one of an input');
      }
      calibration = embedCalibration(withCompanion(row, await this.calibrationsOf(row.rigId, tx)));
      notes.push(...calibrationNotes(row, recording));
    }
    if (baselineId) {
      const row = await tx.findOneBy(RigBaseline, { id: baselineId });
      if (!row) return refuse('baselineId', 'is not a known baseline');
      checkOwner('baselineId', row, recording.rigId);
      if (row.captureId === recording.captureId) refuse('baselineId', 'is this very recording');
      baseline = await baselineOf(row, tx);
      notes.push(...baselineNotes(row, recording, calibration));
    }
    return {
      settings: { ...(calibration ? { calibration } : {}), ...(baseline ? { baseline } : {}) },
      notes,
    };
  }

  /** What the Live page may use of a rig today. @throws AppError NOT_FOUND */
  async live(rigId: string): Promise<LiveSettingsDto> {
    const rig = await this.dataSource.getRepository(Rig).findOneBy({ id: rigId });
    if (!rig) throw new AppError('NOT_FOUND');
    const usable = newestInForce(await this.calibrationsOf(rigId, this.dataSource.manager));
    const own = await this.dataSource
      .getRepository(RigBaseline)
      .find({ where: { rigId, retiredAt: IsNull() }, order: { createdAt: 'DESC' } });
    return {
      limitDbfs: rig.limitDbfs,
      inputs: usable.filter(({ direction }) => direction === 'input').flatMap(toLive),
      outputs: usable.filter(({ direction }) => direction === 'output').flatMap(toLive),
      baselines: await Promise.all(own.map((row) => this.toLiveBaseline(row))),
    };
  }

  private calibrationsOf(rigId: string, tx: EntityManager): Promise<RigCalibration[]> {
    return tx.find(RigCalibration, { where: { rigId }, order: { takenOn: 'DESC', createdAt: 'DESC' } });
  }

  private async toLiveBaseline(row: RigBaseline): Promise<LiveBaselineDto> {
    const baseline = await baselineOf(row, this.dataSource.manager);
    return {
      id: row.id,
      recordId: row.recordId,
      measure: baseline.measure,
      inputRange: row.inputRange,
      sampleRateHz: row.sampleRateHz,
      createdAt: row.createdAt.toISOString(),
      baseline: { ...baseline },
    };
  }
}

async function baselineOf(row: RigBaseline, tx: EntityManager): Promise<BenchRecord> {
  const { content } = await tx.findOneByOrFail(BenchRecordRow, { id: row.recordId });
  // The stored content is a record but for its traces, which are left out here.
  return embedBaseline(content as BenchRecord, row.inputRange);
}

/** Not retired, not past its last day, and not followed by a newer one. */
function newestInForce(rows: readonly RigCalibration[]): RigCalibration[] {
  const day = dayOf(new Date());
  const inForce = rows.filter((row) => calibrationState(row, day) === 'valid');
  return inForce.filter((row) => !inForce.some((other) => isFollowedBy(row, other)));
}

/** A calibration of one channel with the other channel's newest one in force in the same setting. */
function withCompanion(
  row: RigCalibration,
  all: readonly RigCalibration[],
): [RigCalibration, ...RigCalibration[]] {
  const other = row.channel === 'left' ? 'right' : row.channel === 'right' ? 'left' : null;
  const companion = newestInForce(all).find((entry) => entry.channel === other && isSameSetting(row, entry));
  return companion ? [row, companion] : [row];
}

/** Left and right of one setting are offered once, as the left one's. */
function toLive(row: RigCalibration, _: number, usable: readonly RigCalibration[]): LiveCalibrationDto[] {
  const isOffered =
    row.channel === 'right' && usable.some((other) => other.channel === 'left' && isSameSetting(row, other));
  if (isOffered) return [];
  const { id, channel, range, sampleRateHz, loadOhm, validUntil } = row;
  const calibration = embedCalibration(withCompanion(row, usable));
  const channels = calibration.channels.map((entry) => ({ ...entry }));
  return [
    { id, channel, range, sampleRateHz, loadOhm, validUntil, calibration: { ...calibration, channels } },
  ];
}

function checkOwner(
  field: keyof RigChoice,
  row: { readonly rigId: string; readonly retiredAt: Date | null },
  rigId: string | null,
): void {
  if (rigId === null) refuse(field, 'needs a rig: file the recording under the rig it was made with');
  if (row.rigId !== rigId) refuse(field, 'belongs to another rig than the recording’s');
  if (row.retiredAt !== null) refuse(field, 'is retired: choose a newer one');
}

function calibrationNotes(row: RigCalibration, { sampleRateHz, takenAt }: RecordedWith): string[] {
  const day = dayOf(takenAt);
  const notes: string[] = [];
  if (row.sampleRateHz !== sampleRateHz) {
    notes.push(
      `The calibration holds at ${row.sampleRateHz} Hz and the recording is one of ${sampleRateHz} Hz: it is not applicable, and the record says so.`,
    );
  }
  if (day > row.validUntil) {
    notes.push(`The calibration had run out on ${row.validUntil}, before the recording was made.`);
  }
  if (day < row.takenOn) notes.push(`The calibration was made on ${row.takenOn}, after the recording.`);
  return notes;
}

function baselineNotes(
  row: RigBaseline,
  { sampleRateHz }: RecordedWith,
  calibration: EmbeddedCalibration | undefined,
): string[] {
  const notes: string[] = [];
  if (row.sampleRateHz !== sampleRateHz) {
    notes.push(
      `The baseline was taken at ${row.sampleRateHz} Hz and the recording is one of ${sampleRateHz} Hz: it is not applicable, and the record says so.`,
    );
  }
  if (calibration && calibration.inputRange !== row.inputRange) {
    notes.push(
      `The baseline was taken in the range “${row.inputRange}” and the calibration is one of “${calibration.inputRange}”: the baseline is not applicable, and the record says so.`,
    );
  }
  return notes;
}

function refuse(field: string, message: string): never {
  throw new AppError('VALIDATION_FAILED', { fields: { [field]: [message] } });
}
