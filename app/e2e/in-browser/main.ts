import type { MeasureId } from '@benchlark/dsp';
import { wrap } from 'comlink';
import type { InBrowserApi } from './in-browser.worker';

const api = wrap<InBrowserApi>(
  new Worker(new URL('./in-browser.worker.ts', import.meta.url), { type: 'module' }),
);

// What the tests call from outside.
Object.assign(window, {
  runChecks: () => api.runChecks(),
  analyseChosenFile: (measure: MeasureId) => {
    const file = document.querySelector<HTMLInputElement>('#file')?.files?.[0];
    if (!file) throw new Error('no file is chosen');
    return api.analyse(file, measure);
  },
});
