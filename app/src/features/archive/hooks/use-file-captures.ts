import { useMutation, useQueryClient } from '@tanstack/react-query';
import { api, unwrap } from '@/lib/api-client';
import type { Capture, CaptureFiling } from '@/lib/api-schema';
import { captureQueries } from '@/lib/queries/captures';
import { unitQueries } from '@/lib/queries/units';

/** Files several captures one after the other. The first refusal ends it and names the capture it was about. */
export function useFileCaptures(onDone: () => void) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: async ({ captures, filing }: { captures: readonly Capture[]; filing: CaptureFiling }) => {
      for (const { id } of captures) {
        await unwrap(api.PATCH('/api/captures/{id}', { params: { path: { id } }, body: filing }));
      }
    },
    onSuccess: onDone,
    onSettled: () =>
      Promise.all([
        queryClient.invalidateQueries({ queryKey: captureQueries.all() }),
        queryClient.invalidateQueries({ queryKey: unitQueries.all() }),
      ]),
  });
}
