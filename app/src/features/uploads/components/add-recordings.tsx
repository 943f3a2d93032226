import { Button } from '@radix-ui/themes';
import { useEffect, useRef } from 'react';
import { KeyCap } from '@/components/key-cap';
import { keepRecordings } from '../model/dropped-files';
import type { DroppedFiles } from '../model/dropped-files';

export interface AddRecordingsProps {
  onPicked: (picked: DroppedFiles) => void;
  /** Changes each time the key for adding was pressed; the picker opens then. */
  askedFor: string | null;
}

/** The page's main button: opens the browser's picker, for files or for a folder. */
export function AddRecordings({ onPicked, askedFor }: AddRecordingsProps) {
  const filesRef = useRef<HTMLInputElement>(null);
  const folderRef = useRef<HTMLInputElement>(null);
  useEffect(() => {
    if (askedFor !== null) filesRef.current?.click();
  }, [askedFor]);

  const take = (input: HTMLInputElement, isFolder: boolean) => {
    const files = [...(input.files ?? [])];
    input.value = ''; // the same file may be picked again after it was refused
    if (files.length > 0) onPicked(isFolder ? keepRecordings(files) : { files, leftOutCount: 0 });
  };
  return (
    <>
      <Button variant="surface" color="gray" highContrast onClick={() => folderRef.current?.click()}>
        Add a folder
      </Button>
      <Button onClick={() => filesRef.current?.click()} aria-keyshortcuts="u">
        Add recordings <KeyCap>U</KeyCap>
      </Button>
      <input
        ref={filesRef}
        type="file"
        multiple
        hidden
        aria-label="Recordings to add"
        accept=".wav,.wave,.rf64,.bw64,audio/wav,audio/x-wav"
        onChange={(event) => take(event.currentTarget, false)}
      />
      <input
        ref={folderRef}
        type="file"
        multiple
        hidden
        aria-label="Folder of recordings to add"
        webkitdirectory=""
        onChange={(event) => take(event.currentTarget, true)}
      />
    </>
  );
}
