import { useQueryClient } from '@tanstack/react-query';
import { createContext, useContext, useEffect, useState, useSyncExternalStore } from 'react';
import type { ReactNode } from 'react';
import { captureQueries } from '@/lib/queries/captures';
import { uploadFile } from '@/lib/upload-file';
import { isOnItsWay } from '../model/upload-entry';
import type { UploadEntry } from '../model/upload-entry';
import { UploadQueue } from '../model/upload-queue';

const QueueContext = createContext<UploadQueue | null>(null);

/** Stands above the pages: an upload goes on while a person moves between them. */
export function UploadsProvider({ children }: { children: ReactNode }) {
  const queryClient = useQueryClient();
  const [queue] = useState(
    () =>
      new UploadQueue({
        send: uploadFile,
        now: () => Date.now(),
        newId: () => crypto.randomUUID(),
        onStored: () => void queryClient.invalidateQueries({ queryKey: captureQueries.all() }),
      }),
  );
  useWarnBeforeLeaving(queue);
  return <QueueContext value={queue}>{children}</QueueContext>;
}

export function useUploadQueue(): UploadQueue {
  const queue = useContext(QueueContext);
  if (!queue) throw new Error('useUploadQueue is used outside UploadsProvider');
  return queue;
}

export function useUploadEntries(): readonly UploadEntry[] {
  const queue = useUploadQueue();
  return useSyncExternalStore(queue.subscribe, queue.entries);
}

/** The browser asks before the page is closed while bytes are still on their way. */
function useWarnBeforeLeaving(queue: UploadQueue): void {
  useEffect(() => {
    const warn = (event: BeforeUnloadEvent) => {
      if (queue.entries().some(isOnItsWay)) event.preventDefault();
    };
    window.addEventListener('beforeunload', warn);
    return () => window.removeEventListener('beforeunload', warn);
  }, [queue]);
}
