'use client';

import { zodResolver } from '@hookform/resolvers/zod';
import { useState } from 'react';
import {
  type DefaultValues,
  type FieldValues,
  get,
  type Path,
  type RegisterOptions,
  useForm,
} from 'react-hook-form';
import type { ZodType } from 'zod';
import { ApiProblem, sentenceOf } from '@/components/hooks/api-problem';
import { faultWords, wantedWords } from './field-words';

/**
 * A form over the schema that its route parses by. What the schema refuses is said at the field on
 * leaving it; what the server refuses lands on its field where the fault names one, and else in
 * `refusal`.
 */
export function useSchemaForm<In extends FieldValues, Out>(
  schema: ZodType<Out, In>,
  defaultValues: DefaultValues<In>,
) {
  const form = useForm<In, unknown, Out>({
    resolver: zodResolver(schema),
    defaultValues,
    mode: 'onTouched',
  });
  const [refusal, setRefusal] = useState<string | null>(null);
  const { errors, isSubmitting, isDirty, isSubmitSuccessful } = form.formState;

  /** Name, value, error: everything that a field of ours takes. */
  const field = (name: Path<In>, options?: RegisterOptions<In, Path<In>>) => {
    const message: unknown = get(errors, name)?.message;
    const isOwn = get(errors, name)?.type === 'server';
    const words = typeof message === 'string' && !isOwn ? wantedWords(message) : message;
    return {
      ...form.register(name, options),
      error: typeof words === 'string' ? words : undefined,
    };
  };

  const show = (reason: unknown) => {
    if (!(reason instanceof ApiProblem)) return setRefusal(sentenceOf(reason));
    const held = form.getValues();
    const placed = reason.faults.filter(({ item }) => item !== undefined && item in held);
    for (const fault of placed) {
      const where = fault.item as Path<In>;
      form.setError(where, { type: 'server', message: faultWords(fault) }, { shouldFocus: true });
    }
    if (placed.length === 0 || placed.length < reason.faults.length) {
      setRefusal(sentenceOf(reason));
    }
  };

  /** Runs the work with the values as the schema reads them; what it throws is shown. */
  const submit = (work: (values: Out) => Promise<unknown>) =>
    form.handleSubmit(async (values) => {
      setRefusal(null);
      try {
        await work(values);
      } catch (reason) {
        show(reason);
      }
    });

  return {
    form,
    field,
    submit,
    refusal,
    setRefusal,
    isBusy: isSubmitting,
    /** Something is typed that is not stored. */
    isUnsaved: isDirty && !isSubmitting && !(isSubmitSuccessful && refusal === null),
  };
}
