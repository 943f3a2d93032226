import { zodResolver } from '@hookform/resolvers/zod';
import { Button, Dialog, Flex } from '@radix-ui/themes';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { z } from 'zod';
import { CheckboxInput, TextInput } from '@/components/forms/field';
import { FormDialog } from '@/components/forms/form-dialog';
import { api, unwrap } from '@/lib/api-client';
import type { Role } from '@/lib/api-schema';
import { ROLE_WORDS } from '@/lib/capture-words';
import { placeErrors } from '@/lib/form-errors';
import { formatDateTime } from '@/lib/format/date';
import { peopleQueries } from '../api/people-queries';
import { ROLES } from './person-row';

const inviteSchema = z.object({
  email: z.union([z.literal(''), z.email('This does not read as an e-mail address')]),
  roles: z.array(z.enum(ROLES as [Role, ...Role[]])).min(1, 'Choose at least one role'),
});

type InviteValues = z.infer<typeof inviteSchema>;

export interface InviteDialogProps {
  isOpen: boolean;
  onOpenChange: (isOpen: boolean) => void;
}

/** Invites by a letter, or by a link to copy when no address is given. */
export function InviteDialog({ isOpen, onOpenChange }: InviteDialogProps) {
  const queryClient = useQueryClient();
  const [formError, setFormError] = useState<string | null>(null);
  const { register, handleSubmit, setError, reset, formState } = useForm<InviteValues>({
    resolver: zodResolver(inviteSchema),
    defaultValues: { email: '', roles: ['technician'] },
  });
  const invite = useMutation({
    mutationFn: ({ email, roles }: InviteValues) =>
      unwrap(api.POST('/api/invitations', { body: { roles, ...(email === '' ? {} : { email }) } })),
    onSuccess: async () => {
      reset();
      await queryClient.invalidateQueries({ queryKey: peopleQueries.invitations().queryKey });
    },
    onError: (error) => setFormError(placeErrors<InviteValues>(error, ['email', 'roles'], setError)),
  });
  const close = (next: boolean) => {
    if (!next) invite.reset();
    onOpenChange(next);
  };
  if (invite.data) {
    return (
      <MadeDialog
        isOpen={isOpen}
        onOpenChange={close}
        link={invite.data.link ?? ''}
        isMailed={invite.data.isMailed}
        expiresAt={invite.data.expiresAt}
      />
    );
  }
  return (
    <FormDialog
      isOpen={isOpen}
      onOpenChange={close}
      title="Invite somebody"
      description="By a letter to their address, or without one by a link that you hand over yourself."
      submitLabel="Invite"
      isBusy={invite.isPending}
      error={formError}
      onSubmit={(event) => {
        setFormError(null);
        void handleSubmit((values) => invite.mutate(values))(event);
      }}
    >
      <TextInput
        label="E-mail"
        type="email"
        help="Optional."
        error={formState.errors.email?.message}
        {...register('email')}
      />
      <fieldset className="bl-invite-roles">
        <legend>Roles</legend>
        {ROLES.map((role) => (
          <CheckboxInput key={role} label={ROLE_WORDS[role]} value={role} {...register('roles')} />
        ))}
        {formState.errors.roles?.message && (
          <p className="bl-field-error" role="alert">
            {formState.errors.roles.message}
          </p>
        )}
      </fieldset>
    </FormDialog>
  );
}

interface MadeDialogProps extends InviteDialogProps {
  link: string;
  isMailed: boolean;
  expiresAt: string;
}

function MadeDialog({ isOpen, onOpenChange, link, isMailed, expiresAt }: MadeDialogProps) {
  const [isCopied, setIsCopied] = useState(false);
  return (
    <Dialog.Root open={isOpen} onOpenChange={onOpenChange}>
      <Dialog.Content maxWidth="520px">
        <Dialog.Title size="4">
          {isMailed ? 'The letter is on its way' : 'The invitation is made'}
        </Dialog.Title>
        <Dialog.Description size="2">
          The link works once, until {formatDateTime(expiresAt)}. It is shown only now: hand it to nobody
          else.
        </Dialog.Description>
        <p className="bl-invite-link">
          <code>{link}</code>
        </p>
        <Flex gap="3" mt="4" justify="end" wrap="wrap">
          <Button
            variant="surface"
            color="gray"
            highContrast
            onClick={() => void navigator.clipboard.writeText(link).then(() => setIsCopied(true))}
          >
            {isCopied ? 'Copied' : 'Copy the link'}
          </Button>
          <Dialog.Close>
            <Button>Done</Button>
          </Dialog.Close>
        </Flex>
      </Dialog.Content>
    </Dialog.Root>
  );
}
