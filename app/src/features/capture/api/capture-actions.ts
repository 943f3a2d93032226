import { useMutation, useQueryClient } from '@tanstack/react-query';
import { api, unwrap } from '@/lib/api-client';
import type { AnalyseRequest, Capture, CaptureFiling } from '@/lib/api-schema';
import { captureQueries } from '@/lib/queries/captures';
import { unitQueries } from '@/lib/queries/units';

/** Files a capture elsewhere, or changes its note: the recording itself and its records stay as they are. */
export function useFileCapture(captureId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: CaptureFiling) =>
      unwrap(api.PATCH('/api/captures/{id}', { params: { path: { id: captureId } }, body })),
    onSuccess: (capture) => {
      queryClient.setQueryData(captureQueries.detail(captureId).queryKey, capture);
      void queryClient.invalidateQueries({ queryKey: captureQueries.lists() });
      void queryClient.invalidateQueries({ queryKey: unitQueries.all() });
    },
  });
}

/** Asks for one more analysis; the same settings under the same dsp give no second record. */
export function useAnalyse(captureId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: AnalyseRequest) =>
      unwrap(api.POST('/api/captures/{id}/records', { params: { path: { id: captureId } }, body })),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: captureQueries.all() }),
  });
}

/** Computes a record again from the stored bytes and compares. */
export function useVerify(captureId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (recordId: string) =>
      unwrap(api.POST('/api/records/{id}/verify', { params: { path: { id: recordId } } })),
    onSettled: () => queryClient.invalidateQueries({ queryKey: captureQueries.detail(captureId).queryKey }),
  });
}

/** Takes a failed or cancelled analysis up again. */
export function useRetryAnalysis(capture: Capture) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: async () => {
      if (capture.jobId !== null) {
        await unwrap(api.POST('/api/jobs/{id}/retry', { params: { path: { id: capture.jobId } } }));
        return;
      }
      // The job is no longer kept: a plain new analysis does the same work.
      await unwrap(
        api.POST('/api/captures/{id}/records', { params: { path: { id: capture.id } }, body: {} }),
      );
    },
    onSuccess: () => queryClient.invalidateQueries({ queryKey: captureQueries.all() }),
  });
}

/** Stops an analysis that waits or runs; the recording stays. */
export function useCancelAnalysis() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (jobId: string) => unwrap(api.DELETE('/api/jobs/{id}', { params: { path: { id: jobId } } })),
    onSettled: () => queryClient.invalidateQueries({ queryKey: captureQueries.all() }),
  });
}
