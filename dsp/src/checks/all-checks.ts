import type { Check } from './check.js';
import { levelChecks } from './level-checks.js';
import { measureChecks } from './measure-checks.js';
import { responseChecks } from './response-checks.js';
import { signalChecks } from './signal-checks.js';
import { toneChecks } from './tone-checks.js';
import { weightingChecks } from './weighting-checks.js';
import { windowChecks } from './window-checks.js';

/** Every check by topic: a list that Node and a browser's worker run alike. */
export const checksByTopic: Readonly<Record<string, readonly Check[]>> = {
  levels: levelChecks,
  windows: windowChecks,
  weightings: weightingChecks,
  tones: toneChecks,
  measures: measureChecks,
  responses: responseChecks,
  signals: signalChecks,
};

export const allChecks: readonly Check[] = Object.values(checksByTopic).flat();
