import type { FigureUncertainty } from '../../record/record.js';
import { combineUncertainty, type UncertaintyComponent } from './uncertainty.js';

/** Combines the components of each figure; a figure without any has no entry. */
export function combineAll(
  components: Readonly<Record<string, readonly UncertaintyComponent[]>>,
): Record<string, FigureUncertainty> {
  return Object.fromEntries(
    Object.entries(components).flatMap(([key, parts]): [string, FigureUncertainty][] => {
      const combined = combineUncertainty(parts);
      return combined === null ? [] : [[key, combined]];
    }),
  );
}
