import { z } from 'zod';
import type { BatchFiling } from './upload-entry';

const STORAGE_KEY = 'benchlark.batch-filing';

const filingSchema = z.object({
  unitId: z.string().optional(),
  conditionId: z.string().optional(),
  rigId: z.string().optional(),
}) satisfies z.ZodType<BatchFiling>;

/** Where the last batch went, so that the next one from the same bench session goes there too. */
export function recallFiling(storage: Storage = localStorage): BatchFiling {
  try {
    const parsed = filingSchema.safeParse(JSON.parse(storage.getItem(STORAGE_KEY) ?? '{}'));
    return parsed.success ? parsed.data : {};
  } catch {
    return {}; // storage is forbidden or holds something else: the batch begins unsorted
  }
}

export function rememberFiling(filing: BatchFiling, storage: Storage = localStorage): void {
  try {
    storage.setItem(STORAGE_KEY, JSON.stringify(filing));
  } catch {
    return; // storage is forbidden or full: only the memory of it is lost
  }
}
