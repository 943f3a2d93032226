import { compareRecords, type BenchRecord, type RecordDifference } from '@benchlark/dsp';
import { api, unwrap } from '@/lib/api-client';
import type { Capture } from '@/lib/api-schema';
import { uploadFile } from '@/lib/upload-file';
import type { LocalTake } from './take';

/** Whether the server's record of the stored bytes is the one that this browser made of the recorded ones. */
export type Agreement =
  | { readonly kind: 'agrees'; readonly recordId: string }
  | { readonly kind: 'differs'; readonly recordId: string; readonly differing: readonly RecordDifference[] }
  | { readonly kind: 'failed'; readonly why: string };

const POLL_MS = 700;

/**
 * Sends a take. The same take sent twice is stored once.
 *
 * @throws ApiError when the server refuses it or does not answer
 */
export function sendTake(
  { id, wav, fileName, filing, statement }: LocalTake,
  hooks: { readonly signal: AbortSignal; readonly onProgress: (sentBytes: number) => void },
): Promise<Capture> {
  const { unitId, conditionId, rigId } = filing;
  return uploadFile(
    {
      file: new File([wav], fileName, { type: 'audio/wav' }),
      filing: {
        ...(unitId ? { unitId } : {}),
        ...(conditionId ? { conditionId } : {}),
        ...(rigId ? { rigId } : {}),
      },
      take: JSON.stringify(statement),
      idempotencyKey: id,
    },
    hooks,
  );
}

/**
 * Waits for the server's own analysis and compares it key by key with what was measured here.
 *
 * @throws ApiError; an `AbortError`
 */
export async function agreementOf(
  take: Pick<LocalTake, 'record' | 'failure'>,
  captureId: string,
  signal: AbortSignal,
): Promise<Agreement> {
  for (;;) {
    const capture = await unwrap(
      api.GET('/api/captures/{id}', { params: { path: { id: captureId } }, signal }),
    );
    if (capture.state === 'failed') {
      return {
        kind: 'failed',
        why: capture.failure?.message ?? 'The server could not measure it.',
      };
    }
    if (capture.state === 'done' && capture.record) {
      const { id } = capture.record;
      const detail = await unwrap(api.GET('/api/records/{id}', { params: { path: { id } }, signal }));
      if (!take.record) return { kind: 'failed', why: take.failure ?? 'It could not be measured here.' };
      const differing = differencesOf(detail.record as unknown as BenchRecord, take.record);
      return differing.length === 0
        ? { kind: 'agrees', recordId: id }
        : { kind: 'differs', recordId: id, differing };
    }
    await new Promise((resolve) => setTimeout(resolve, POLL_MS));
    signal.throwIfAborted();
  }
}

/** Traces are references in the server's record, known by the hashes of their bytes; every other key is compared. */
export function differencesOf(stored: BenchRecord, computed: BenchRecord): RecordDifference[] {
  return compareRecords(withoutTraces(stored), withoutTraces(computed));
}

function withoutTraces<Tree>(tree: Tree): Tree {
  return JSON.parse(JSON.stringify(tree, (key, value: unknown) => (key === 'traces' ? {} : value))) as Tree;
}
