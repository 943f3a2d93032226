import { DspInputError } from '../errors.js';
import { dynamicRangeMeasure } from './dynamic-range/dynamic-range-measure.js';
import { idleMeasure } from './idle/idle-measure.js';
import { intersampleMeasure } from './intersample/intersample-measure.js';
import { jitterMeasure } from './jitter/jitter-measure.js';
import { loudnessMeasure } from './loudness/loudness-measure.js';
import { levelStepsMeasure } from './level-steps/level-steps-measure.js';
import { filterMeasure } from './filter/filter-measure.js';
import type { Measure } from './measure.js';
import { multitoneMeasure } from './multitone/multitone-measure.js';
import { createProgrammeMeasure } from './programme/programme-measure.js';
import { twoToneMeasure } from './two-tone/two-tone-measure.js';
import { twoToneStepsMeasure } from './two-tone-steps/two-tone-steps-measure.js';
import { separationMeasure } from './separation/separation-measure.js';
import { sweepMeasure } from './sweep/sweep-measure.js';
import { toneMeasure } from './tone/tone-measure.js';

const singleMeasures: readonly Measure[] = [
  toneMeasure,
  idleMeasure,
  dynamicRangeMeasure,
  twoToneMeasure,
  twoToneStepsMeasure,
  levelStepsMeasure,
  sweepMeasure,
  separationMeasure,
  filterMeasure,
  multitoneMeasure,
  jitterMeasure,
  intersampleMeasure,
  loudnessMeasure,
];

/** Every measure there is. Command line, worker, server and pages find theirs here. */
export const measures: readonly Measure[] = [...singleMeasures, createProgrammeMeasure(singleMeasures)];

/**
 * Finds a measure by its id.
 *
 * @throws DspInputError `UNKNOWN_NAME`, which lists the ids there are
 */
export function getMeasure(id: string): Measure {
  const measure = measures.find((entry) => entry.id === id);
  if (measure !== undefined) return measure;
  const known = measures.map((entry) => entry.id).join(', ');
  throw new DspInputError('UNKNOWN_NAME', `there is no measure "${id}": there are ${known}`);
}
