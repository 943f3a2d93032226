import type { RecordedWith } from '../rigs/rig-settings.service';
import type { Capture } from './capture.entity';

/** A stored capture as what is named of a rig must fit it. */
export function recordedWith({ id, rigId, sampleRateHz, take, uploadedAt }: Capture): RecordedWith {
  return {
    captureId: id,
    rigId,
    sampleRateHz,
    takenAt: take === null ? uploadedAt : new Date(take.startedAt),
  };
}
