import type { BenchRecord, Finding } from '../record/record.js';
import { viewRecord, type RecordView } from './record-view.js';
import { balanceRule, polarityRule, wiringRule } from './rules/channels.js';
import { clippingRule } from './rules/clipping.js';
import { crossoverRule, truncationRule } from './rules/low-levels.js';
import { dcOffsetRule, frameNoiseRule, mainsHumRule, noiseLimitedRule } from './rules/noise.js';
import { overloadRule } from './rules/recording.js';
import { imageRule, rollOffRule } from './rules/response.js';
import { intersampleRule, jitterRule } from './rules/timing.js';

type Rule = (view: RecordView) => readonly Finding[];

const RULES: readonly Rule[] = [
  overloadRule,
  clippingRule,
  crossoverRule,
  truncationRule,
  mainsHumRule,
  frameNoiseRule,
  jitterRule,
  intersampleRule,
  rollOffRule,
  imageRule,
  polarityRule,
  wiringRule,
  balanceRule,
  dcOffsetRule,
  noiseLimitedRule,
];

const GRAVITY: Readonly<Record<Finding['severity'], number>> = { fault: 0, caution: 1, note: 2 };

/**
 * Proposes what a record shows, the gravest first; a person confirms or dismisses.
 *
 * @param record - as analysed or read back, with at least reduced traces; its own findings are not looked at
 * @returns in a stable order
 */
export function proposeFindings(record: BenchRecord): Finding[] {
  const view = viewRecord(record);
  const found = RULES.flatMap((rule) => rule(view));
  return found
    .map((finding, index) => ({ finding, index }))
    .sort(
      (one, other) =>
        GRAVITY[one.finding.severity] - GRAVITY[other.finding.severity] || one.index - other.index,
    )
    .map(({ finding }) => finding);
}
