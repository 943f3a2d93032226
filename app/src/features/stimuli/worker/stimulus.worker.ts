import { expose } from 'comlink';
import type { StimulusOptions } from '@benchlark/dsp';
import { previewStimulus } from './preview';
import { renderStimulus, type SampleChunk } from '@/lib/render-samples';
import { writeStimulus } from './write';

let isCancelled = false;

/** What the page asks of the worker; errors come back as plain `Error`s with dsp's message. */
const api = {
  preview: (name: string, options: StimulusOptions) => previewStimulus(name, options),
  write: (name: string, options: StimulusOptions, onProgress: (share: number) => void) => {
    isCancelled = false;
    return writeStimulus(name, options, { onProgress, isCancelled: () => isCancelled });
  },
  /** Stops what is being written at its next block. */
  cancel: () => {
    isCancelled = true;
  },
  render: (
    name: string,
    options: Omit<StimulusOptions, 'bitsPerSample' | 'dither'>,
    onChunk: (chunk: SampleChunk) => Promise<void>,
  ) => renderStimulus(name, options, onChunk),
};

export type StimulusWorkerApi = typeof api;

expose(api);
