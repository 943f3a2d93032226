import { useState } from 'react';
import { formatCounted } from '@/lib/format/quantity';
import { useSession } from '@/lib/use-session';
import { recallFiling, rememberFiling } from '../model/batch-filing';
import type { DroppedFiles } from '../model/dropped-files';
import type { BatchFiling } from '../model/upload-entry';
import { useUploadQueue } from './uploads-context';

/** What the archive's page needs to take files in: where they go, and the way in. */
export function useArrivals() {
  const queue = useUploadQueue();
  const { limits } = useSession();
  const [filing, setFiling] = useState<BatchFiling>(recallFiling);
  const [notice, setNotice] = useState<string | null>(null);
  return {
    filing,
    notice,
    changeFiling: (next: BatchFiling) => {
      setFiling(next);
      rememberFiling(next);
    },
    take: ({ files, leftOutCount }: DroppedFiles) => {
      queue.add(files, filing, limits.maxUploadBytes);
      setNotice(leftOutWords(files.length, leftOutCount));
    },
  };
}

function leftOutWords(takenCount: number, leftOutCount: number): string | null {
  if (leftOutCount === 0) return takenCount === 0 ? 'Nothing was found in it.' : null;
  const left = `${formatCounted(leftOutCount, 'other file')} in the folder ${leftOutCount === 1 ? 'was' : 'were'} left out: only wave files are taken from a folder.`;
  return takenCount === 0 ? `No recording was found. ${left}` : left;
}
