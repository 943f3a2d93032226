import { createContext, useContext, useEffect, useState, useSyncExternalStore, type ReactNode } from 'react';
import { wrap } from 'comlink';
import { AudioRig } from '../audio/audio-rig';
import { LiveBench } from '../model/live-bench';
import type { LiveState } from '../model/live-state';
import { TakeStore } from '../store/take-store';
import type { LiveWorkerApi } from '../worker/live.worker';

const BenchContext = createContext<LiveBench | null>(null);

function startWorker() {
  const worker = new Worker(new URL('../worker/live.worker.ts', import.meta.url), { type: 'module' });
  return { api: wrap<LiveWorkerApi>(worker), stop: () => worker.terminate() };
}

/** One bench for as long as the page stands; leaving it ends every sound and lets go of the interface. */
export function LiveBenchProvider({ children }: { children: ReactNode }) {
  const [bench] = useState(
    () =>
      new LiveBench({
        startWorker,
        openRig: (choice, events) => AudioRig.open(choice, events),
        store: new TakeStore(),
        now: () => new Date(),
        newId: () => crypto.randomUUID(),
      }),
  );
  useEffect(() => {
    void bench.loadTakes();
    return () => void bench.close();
  }, [bench]);
  return <BenchContext value={bench}>{children}</BenchContext>;
}

export function useLiveBench(): LiveBench {
  const bench = useContext(BenchContext);
  if (!bench) throw new Error('useLiveBench is used outside LiveBenchProvider');
  return bench;
}

/** A part of the bench's state; the component is drawn again only when that part is another. */
export function useLive<Part>(select: (state: LiveState) => Part): Part {
  const bench = useLiveBench();
  return useSyncExternalStore(bench.subscribe, () => select(bench.state()));
}
