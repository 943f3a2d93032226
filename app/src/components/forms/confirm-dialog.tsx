import { AlertDialog, Button, Flex } from '@radix-ui/themes';
import type { ReactNode } from 'react';
import { FormError } from './field';

export interface ConfirmDialogProps {
  isOpen: boolean;
  onOpenChange: (isOpen: boolean) => void;
  /** A question or a statement of what will happen. */
  title: string;
  /** What it means and whether it can be taken back; phrasing only, it stands in a paragraph. */
  children: ReactNode;
  /** A verb that says what happens. */
  confirmLabel: string;
  cancelLabel?: string;
  isDestructive?: boolean;
  isBusy?: boolean;
  isDisabled?: boolean;
  error?: string | null;
  /** The dialog stays open until the caller closes it. */
  onConfirm: () => void;
}

/** Asks before what can't be taken back. Esc and the second button leave all as it is. */
export function ConfirmDialog(props: ConfirmDialogProps) {
  const { isOpen, onOpenChange, title, children, confirmLabel, cancelLabel = 'Not yet' } = props;
  const { isDestructive = false, isBusy = false, isDisabled = false, error, onConfirm } = props;
  return (
    <AlertDialog.Root open={isOpen} onOpenChange={onOpenChange}>
      <AlertDialog.Content maxWidth="460px">
        <AlertDialog.Title size="4">{title}</AlertDialog.Title>
        <AlertDialog.Description size="2">{children}</AlertDialog.Description>
        {error && <FormError>{error}</FormError>}
        <Flex gap="3" mt="4" justify="end" wrap="wrap">
          <AlertDialog.Cancel>
            <Button variant="surface" color="gray" highContrast>
              {cancelLabel}
            </Button>
          </AlertDialog.Cancel>
          <Button
            {...(isDestructive ? { variant: 'outline' as const, color: 'red' as const } : {})}
            disabled={isDisabled || isBusy}
            aria-busy={isBusy}
            onClick={onConfirm}
          >
            {confirmLabel}
          </Button>
        </Flex>
      </AlertDialog.Content>
    </AlertDialog.Root>
  );
}
