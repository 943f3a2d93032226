import { type Remote, wrap } from 'comlink';
import { useEffect, useRef } from 'react';
import type { StimulusWorkerApi } from '../worker/stimulus.worker';

/** Starts the worker that makes stimuli. */
export function startStimulusWorker(): { api: Remote<StimulusWorkerApi>; stop: () => void } {
  const worker = new Worker(new URL('../worker/stimulus.worker.ts', import.meta.url), { type: 'module' });
  return { api: wrap<StimulusWorkerApi>(worker), stop: () => worker.terminate() };
}

/** One worker for as long as the page stands, started when it is first asked. */
export function useStimulusWorker(): () => Remote<StimulusWorkerApi> {
  const started = useRef<ReturnType<typeof startStimulusWorker> | null>(null);
  useEffect(
    () => () => {
      started.current?.stop();
      started.current = null;
    },
    [],
  );
  return () => (started.current ??= startStimulusWorker()).api;
}
