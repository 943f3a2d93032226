import windows from '../../../test-vectors/windows/windows.json' with { type: 'json' };
import { createWindow } from '../window/create-window.js';
import { WINDOW_NAMES } from '../window/window-coefficients.js';
import { highestSideLobeDb, scallopingLossDb } from '../window/window-response.js';
import type { Check } from './check.js';

/** Each window's figures against those of its published coefficients; tolerances are the table's own. */
export const windowChecks: readonly Check[] = WINDOW_NAMES.flatMap((name) => {
  const row = windows.windows[name];
  const { source } = row;
  return [
    {
      id: `window/${name}/coherent-gain`,
      source,
      expected: row.coherentGain,
      tolerance: 1e-9,
      unit: '',
      compute: () => createWindow(name, 1024).coherentGain,
    },
    {
      id: `window/${name}/noise-bandwidth`,
      source,
      expected: row.enbwBins,
      tolerance: 1e-5,
      unit: 'bins',
      compute: () => createWindow(name, 1024).enbwBins,
    },
    {
      id: `window/${name}/scalloping`,
      source,
      expected: row.scallopLossDb,
      tolerance: 0.005,
      unit: 'dB',
      compute: () => scallopingLossDb(name),
    },
    {
      id: `window/${name}/side-lobe`,
      source,
      expected: row.highestSideLobeDb,
      tolerance: 0.005,
      unit: 'dB',
      compute: () => highestSideLobeDb(name),
    },
  ];
});
