import { describe, expect, it } from 'vitest';
import { keepRecordings, readDroppedFiles } from './dropped-files';

function fileEntry(name: string) {
  return { isFile: true, file: (resolve: (file: File) => void) => resolve(new File(['x'], name)) };
}

function folderEntry(children: unknown[]) {
  const portions = [children.slice(0, 1), children.slice(1), []];
  return {
    isFile: false,
    createReader: () => ({
      readEntries: (resolve: (entries: unknown[]) => void) => resolve(portions.shift() ?? []),
    }),
  };
}

function transfer(entries: unknown[]): DataTransfer {
  return {
    items: entries.map((entry) => ({ webkitGetAsEntry: () => entry })),
    files: [],
  } as unknown as DataTransfer;
}

describe('what is dropped on the page', () => {
  it('takes a single file whatever its name: the server judges by its bytes', async () => {
    const dropped = await readDroppedFiles(transfer([fileEntry('take 4.bin')]));
    expect(dropped.files.map(({ name }) => name)).toEqual(['take 4.bin']);
  });

  it('takes only recordings out of folders, however deep and in however many portions', async () => {
    const folder = folderEntry([
      fileEntry('a.wav'),
      fileEntry('notes.txt'),
      folderEntry([fileEntry('b.RF64'), fileEntry('._b.wav')]),
    ]);
    const dropped = await readDroppedFiles(transfer([folder]));
    expect(dropped.files.map(({ name }) => name)).toEqual(['a.wav', 'b.RF64']);
    expect(dropped.leftOutCount).toBe(2);
  });

  it('leaves out the shadow files some systems write beside each file', () => {
    expect(keepRecordings([new File(['x'], '._a.wav'), new File(['x'], 'a.WAV')])).toMatchObject({
      leftOutCount: 1,
    });
  });
});
