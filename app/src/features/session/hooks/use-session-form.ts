import { zodResolver } from '@hookform/resolvers/zod';
import { useState, type BaseSyntheticEvent } from 'react';
import { useForm } from 'react-hook-form';
import type { DefaultValues, FieldPath, FieldValues, UseFormReturn } from 'react-hook-form';
import type { z } from 'zod';
import { placeErrors } from '@/lib/form-errors';

export interface SessionFormOptions<Values extends FieldValues> {
  schema: z.ZodType<Values, Values>;
  defaults: DefaultValues<Values>;
  fields: readonly FieldPath<Values>[];
  send: (values: Values) => Promise<void>;
}

export type SessionForm<Values extends FieldValues> = UseFormReturn<Values, unknown, Values> & {
  submit: (event?: BaseSyntheticEvent) => Promise<void>;
  formError: string | null;
};

/** One form of the pages before the bench: what is typed is checked, sent, and refused field by field. */
export function useSessionForm<Values extends FieldValues>(
  options: SessionFormOptions<Values>,
): SessionForm<Values> {
  const { schema, defaults, fields, send } = options;
  const [formError, setFormError] = useState<string | null>(null);
  const form = useForm<Values, unknown, Values>({ resolver: zodResolver(schema), defaultValues: defaults });
  const submit = form.handleSubmit(async (values) => {
    setFormError(null);
    try {
      await send(values);
    } catch (error) {
      setFormError(placeErrors(error, fields, form.setError));
    }
  });
  return { ...form, submit, formError };
}
