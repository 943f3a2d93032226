import { useMutation, useQueryClient } from '@tanstack/react-query';
import { ConfirmDialog } from '@/components/forms/confirm-dialog';
import { api, unwrap } from '@/lib/api-client';
import type { RigCalibration } from '@/lib/api-schema';
import { errorWords } from '@/lib/error-words';
import { rigQueries } from '@/lib/queries/units';

export interface RetireCalibrationProps {
  calibration: RigCalibration;
  onClose: () => void;
}

/** Asks before a calibration is taken out of use for good. */
export function RetireCalibration({ calibration, onClose }: RetireCalibrationProps) {
  const queryClient = useQueryClient();
  const retire = useMutation({
    mutationFn: () => {
      const path = { id: calibration.rigId, calibrationId: calibration.id };
      return unwrap(api.POST('/api/rigs/{id}/calibrations/{calibrationId}/retire', { params: { path } }));
    },
    onSuccess: async () => {
      await queryClient.invalidateQueries({ queryKey: rigQueries.all() });
      onClose();
    },
  });
  return (
    <ConfirmDialog
      isOpen
      onOpenChange={(isOpen) => {
        if (!isOpen) onClose();
      }}
      title={`Retire the calibration of ${calibration.range}?`}
      confirmLabel="Retire it"
      isDestructive
      isBusy={retire.isPending}
      error={retire.isError ? errorWords(retire.error) : null}
      onConfirm={() => retire.mutate()}
    >
      No new analysis can use it then, and this can’t be taken back. Records that were made with it keep it.
    </ConfirmDialog>
  );
}
