import { useQueryClient } from '@tanstack/react-query';
import type { InfiniteData, QueryClient } from '@tanstack/react-query';
import { useEffect } from 'react';
import { useUploadQueue } from '@/features/uploads/hooks/uploads-context';
import type { Capture, CapturePage } from '@/lib/api-schema';
import { followEvents } from '@/lib/event-stream';
import type { CaptureEvent } from '@/lib/event-stream';
import { captureQueries } from '@/lib/queries/captures';

/** Keeps what is shown true while captures are analysed: by the server's events, or by asking while they are down. */
export function useLiveEvents(): void {
  const queryClient = useQueryClient();
  const queue = useUploadQueue();
  useEffect(() => {
    const refresh = () => {
      void queryClient.invalidateQueries({ queryKey: captureQueries.all() });
      void queryClient.invalidateQueries({ queryKey: ['today'] });
      void queryClient.invalidateQueries({ queryKey: ['jobs'] });
    };
    const askForOpen = () => {
      refresh();
      for (const id of queue.openCaptureIds()) {
        void queryClient
          .query({ ...captureQueries.detail(id), staleTime: 0 })
          .then(({ state, progress }) => queue.applyEvent({ captureId: id, state, progress }))
          .catch(() => undefined); // still no answer: the next round asks again
      }
    };
    return followEvents('/api/events', {
      onCapture: (event) => {
        queue.applyEvent(event);
        if (event.state === 'analysing') showProgress(queryClient, event);
        else refresh();
      },
      onPoll: askForOpen,
      onResume: askForOpen,
    });
  }, [queryClient, queue]);
}

/** A step of progress is only written into what is shown: fetching it all again ten times a second helps nobody. */
function showProgress(queryClient: QueryClient, { captureId, state, progress }: CaptureEvent): void {
  const advance = (capture: Capture): Capture =>
    capture.id === captureId ? { ...capture, state, progress } : capture;
  queryClient.setQueryData(
    captureQueries.detail(captureId).queryKey,
    (capture) => capture && advance(capture),
  );
  queryClient.setQueriesData<InfiniteData<CapturePage> | CapturePage>(
    { queryKey: captureQueries.lists() },
    (list) => {
      if (!list) return list;
      if ('items' in list) return { ...list, items: list.items.map(advance) };
      return { ...list, pages: list.pages.map((page) => ({ ...page, items: page.items.map(advance) })) };
    },
  );
}
