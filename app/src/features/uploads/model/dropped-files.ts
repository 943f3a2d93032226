const WAVE_NAME = /\.(wav|wave|rf64|bw64)$/i;

export interface DroppedFiles {
  readonly files: readonly File[];
  /** Files in a folder that are not named as recordings: left where they are. */
  readonly leftOutCount: number;
}

/**
 * Everything that was dropped. A file dropped by itself is always taken (the server judges by its bytes); from a
 * folder only what is named as a wave file, so that its pictures and notes stay behind.
 */
export async function readDroppedFiles(transfer: DataTransfer): Promise<DroppedFiles> {
  // Entries must be taken before the first await: the list is emptied when the event is over.
  const entries = [...transfer.items].flatMap((item) => item.webkitGetAsEntry() ?? []);
  if (entries.length === 0) return { files: [...transfer.files], leftOutCount: 0 };
  const taken: File[] = [];
  let leftOutCount = 0;
  for (const entry of entries) {
    if (entry.isFile) {
      taken.push(await fileOf(entry as FileSystemFileEntry));
      continue;
    }
    const inside = await filesInside(entry as FileSystemDirectoryEntry);
    const picked = keepRecordings(inside);
    taken.push(...picked.files);
    leftOutCount += picked.leftOutCount;
  }
  return { files: taken, leftOutCount };
}

export function keepRecordings(files: readonly File[]): DroppedFiles {
  const recordings = files.filter((file) => WAVE_NAME.test(file.name) && !file.name.startsWith('._'));
  return { files: recordings, leftOutCount: files.length - recordings.length };
}

async function filesInside(folder: FileSystemDirectoryEntry): Promise<File[]> {
  const reader = folder.createReader();
  const found: File[] = [];
  // A reader hands out its entries in portions, and an empty one at the end.
  for (;;) {
    const portion = await new Promise<FileSystemEntry[]>((resolve, reject) =>
      reader.readEntries(resolve, reject),
    );
    if (portion.length === 0) return found;
    for (const entry of portion) {
      if (entry.isFile) found.push(await fileOf(entry as FileSystemFileEntry));
      else found.push(...(await filesInside(entry as FileSystemDirectoryEntry)));
    }
  }
}

function fileOf(entry: FileSystemFileEntry): Promise<File> {
  return new Promise((resolve, reject) => entry.file(resolve, reject));
}
