import { CaptureOverview } from '../captures/capture-overview.entity';
import { Capture } from '../captures/capture.entity';
import { UploadKey } from '../captures/upload-key.entity';
import { AnalysisJob } from '../jobs/analysis-job.entity';
import { Worker } from '../jobs/worker.entity';
import { RecordFigure } from '../records/record-figure.entity';
import { RecordTrace } from '../records/record-trace.entity';
import { BenchRecordRow } from '../records/record.entity';
import { RigBaseline } from '../rigs/rig-baseline.entity';
import { RigCalibration } from '../rigs/rig-calibration.entity';
import { Rig } from '../rigs/rig.entity';
import { StoredObject } from '../storage/stored-object.entity';
import { UnitCondition } from '../units/unit-condition.entity';
import { Unit } from '../units/unit.entity';

/** The archive: units, rigs, captures, jobs and records. */
export const archiveEntities = [
  Unit,
  UnitCondition,
  Rig,
  RigCalibration,
  RigBaseline,
  StoredObject,
  Capture,
  CaptureOverview,
  UploadKey,
  Worker,
  AnalysisJob,
  BenchRecordRow,
  RecordFigure,
  RecordTrace,
];
