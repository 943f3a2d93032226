import type { Warning } from './record.js';
import { WARNING_SENTENCES, type WarningCode } from './warning.js';

/**
 * Makes a warning from its sentence in the closed list.
 *
 * @param code - which warning
 * @param values - what stands for each `{name}` of the sentence, in words with units
 * @param about - the channel and the figures it concerns; left out when it concerns the whole capture
 * @returns the warning with its sentence filled in; a `{name}` without a value stays as it is
 */
export function makeWarning(
  code: WarningCode,
  values: Readonly<Record<string, string | number>> = {},
  about: { readonly channel?: string; readonly figures?: readonly string[] } = {},
): Warning {
  const message = WARNING_SENTENCES[code].replace(/\{(\w+)\}/g, (whole, name: string) =>
    name in values ? String(values[name]) : whole,
  );
  return { code, channel: about.channel ?? null, figures: about.figures ?? [], message };
}
