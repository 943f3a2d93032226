import { Button, Dialog, Flex } from '@radix-ui/themes';
import type { FormEventHandler, ReactNode } from 'react';
import { FormError } from './field';

export interface FormDialogProps {
  isOpen: boolean;
  onOpenChange: (isOpen: boolean) => void;
  title: string;
  description: string;
  children: ReactNode;
  submitLabel: string;
  isBusy: boolean;
  error: string | null;
  onSubmit: FormEventHandler<HTMLFormElement>;
}

/** A form in a dialog: its fields, what the server refused about it as a whole, and the two buttons. */
export function FormDialog(props: FormDialogProps) {
  const { isOpen, onOpenChange, title, description, children, submitLabel, isBusy, error, onSubmit } = props;
  return (
    <Dialog.Root open={isOpen} onOpenChange={onOpenChange}>
      <Dialog.Content maxWidth="480px">
        <Dialog.Title size="4">{title}</Dialog.Title>
        <Dialog.Description size="2" mb="4">
          {description}
        </Dialog.Description>
        <form
          noValidate
          onSubmit={(event) => {
            // A dialog is drawn elsewhere, but its events climb to the form it was opened from.
            event.stopPropagation();
            onSubmit(event);
          }}
        >
          {children}
          {error && <FormError>{error}</FormError>}
          <Flex gap="3" mt="5" justify="end" wrap="wrap">
            <Dialog.Close>
              <Button type="button" variant="surface" color="gray" highContrast>
                Not now
              </Button>
            </Dialog.Close>
            <Button type="submit" disabled={isBusy} aria-busy={isBusy}>
              {submitLabel}
            </Button>
          </Flex>
        </form>
      </Dialog.Content>
    </Dialog.Root>
  );
}
