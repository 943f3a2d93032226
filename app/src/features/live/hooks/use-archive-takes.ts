import { useQueryClient } from '@tanstack/react-query';
import { useCallback, useEffect, useRef, useState } from 'react';
import { isAbort } from '@/lib/api-client';
import { ApiError } from '@/lib/api-error';
import type { Capture } from '@/lib/api-schema';
import { errorWords } from '@/lib/error-words';
import { captureQueries } from '@/lib/queries/captures';
import { agreementOf, sendTake, type Agreement } from '../model/archive-take';
import type { LocalTake } from '../model/take';
import { useLive, useLiveBench } from './live-bench-context';

export type Sending =
  | { readonly kind: 'sending'; readonly share: number }
  | { readonly kind: 'waiting'; readonly why: string }
  | { readonly kind: 'stored'; readonly capture: Capture; readonly agreement: Agreement | null };

const RETRY_MS = 15_000;

/** Archives what was kept: at once, or as soon as there is a way. What the archive holds leaves this browser. */
export function useArchiveTakes(): {
  sendings: Readonly<Record<string, Sending>>;
  sent: readonly LocalTake[];
  keep: (take: LocalTake) => void;
} {
  const bench = useLiveBench();
  const takes = useLive((state) => state.takes);
  const queryClient = useQueryClient();
  const [sendings, setSendings] = useState<Readonly<Record<string, Sending>>>({});
  const [sent, setSent] = useState<readonly LocalTake[]>([]);
  const underWay = useRef(new Set<string>());
  const abort = useRef(new AbortController());

  const say = useCallback(
    (id: string, sending: Sending) => setSendings((known) => ({ ...known, [id]: sending })),
    [],
  );

  const send = useCallback(
    async (take: LocalTake) => {
      if (underWay.current.has(take.id)) return;
      underWay.current.add(take.id);
      const { signal } = abort.current;
      try {
        const onProgress = (bytes: number) => say(take.id, { kind: 'sending', share: bytes / take.wav.size });
        onProgress(0);
        const capture = await sendTake(take, { signal, onProgress });
        say(take.id, { kind: 'stored', capture, agreement: null });
        setSent((known) => [take, ...known]);
        await bench.remove(take.id);
        void queryClient.invalidateQueries({ queryKey: captureQueries.all() });
        const agreement = await agreementOf(take, capture.id, signal);
        say(take.id, { kind: 'stored', capture, agreement });
      } catch (reason) {
        if (isAbort(reason)) return;
        const why = reason instanceof ApiError ? errorWords(reason) : 'The archive was not reached.';
        setSendings((known) =>
          known[take.id]?.kind === 'stored'
            ? {
                ...known,
                [take.id]: { ...known[take.id], agreement: { kind: 'failed', why } } as Sending,
              }
            : { ...known, [take.id]: { kind: 'waiting', why } },
        );
      } finally {
        underWay.current.delete(take.id);
      }
    },
    [bench, queryClient, say],
  );

  useEffect(() => {
    const sendAll = () => takes.filter(({ isKept }) => isKept).forEach((take) => void send(take));
    sendAll();
    const timer = setInterval(sendAll, RETRY_MS);
    window.addEventListener('online', sendAll);
    return () => {
      clearInterval(timer);
      window.removeEventListener('online', sendAll);
    };
  }, [takes, send]);

  useEffect(() => {
    const controller = new AbortController();
    abort.current = controller;
    return () => controller.abort();
  }, []);

  const keep = useCallback((take: LocalTake) => void bench.update({ ...take, isKept: true }), [bench]);
  return { sendings, sent, keep };
}
