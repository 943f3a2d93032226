import { proxy, type Remote } from 'comlink';
import { useState } from 'react';
import { downloadBlob } from '@/components/charts/download-blob';
import { fileNameOf, type StimulusForm } from '../model/stimulus-form';
import type { StimulusWorkerApi } from '../worker/stimulus.worker';

export type FileState =
  | { readonly kind: 'idle' }
  | { readonly kind: 'writing'; readonly share: number }
  | { readonly kind: 'written'; readonly fileName: string; readonly sha256: string }
  | { readonly kind: 'failed'; readonly why: string };

/** Comlink hands errors over as plain ones: the words tell a stop that was asked for. */
const STOPPED = 'the file was not written';

/** Writes a stimulus and its descriptor to the reader's downloads. */
export function useStimulusFile(worker: () => Remote<StimulusWorkerApi>) {
  const [state, setState] = useState<FileState>({ kind: 'idle' });
  const write = async (form: StimulusForm): Promise<void> => {
    setState({ kind: 'writing', share: 0 });
    try {
      const { wav, descriptor } = await worker().write(
        form.name,
        form.options,
        proxy((share: number) => setState({ kind: 'writing', share })),
      );
      const fileName = fileNameOf(form);
      downloadBlob(wav, fileName);
      const text = `${JSON.stringify(descriptor, null, 2)}\n`;
      downloadBlob(new Blob([text], { type: 'application/json' }), fileName.replace(/\.wav$/, '.json'));
      setState({ kind: 'written', fileName, sha256: descriptor.sha256 });
    } catch (error) {
      const why = error instanceof Error ? error.message : String(error);
      setState(why.includes(STOPPED) ? { kind: 'idle' } : { kind: 'failed', why });
    }
  };
  const cancel = (): void => void worker().cancel();
  return { state, write, cancel };
}
