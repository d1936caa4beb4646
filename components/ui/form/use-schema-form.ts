'use client';

import { useState } from 'react';
import {
  type DefaultValues,
  type FieldError,
  type FieldValues,
  get,
  type Path,
  type RegisterOptions,
  type Resolver,
  useForm,
} from 'react-hook-form';
import type { input, output, ZodType } from 'zod';
import { ApiProblem, sentenceOf } from '@/components/hooks/api-problem';
import { faultWords, wantedWords } from './field-words';

type Loads<In, Out> = () => Promise<ZodType<Out, In>>;

/** Loaded with the first field that is left: a form is drawn without it. */
async function loadResolver<In extends FieldValues, Out>(
  schema: Loads<In, Out>,
): Promise<Resolver<In, unknown, Out>> {
  const [{ zodResolver }, wanted] = await Promise.all([
    import('@hookform/resolvers/zod'),
    schema(),
  ]);
  return zodResolver(wanted);
}

/** A schema of a form: what its fields hold is an object. */
type FormSchema = ZodType<unknown, FieldValues>;

/**
 * A form over the schema that its route parses by, given by what loads it. What the schema refuses
 * is said at the field on leaving it; what the server refuses lands on its field where the fault
 * names one, and else in `refusal`.
 */
export function useSchemaForm<Schema extends FormSchema>(
  schema: () => Promise<Schema>,
  defaultValues: DefaultValues<input<Schema>>,
) {
  type In = input<Schema>;
  type Out = output<Schema>;
  const form = useForm<In, unknown, Out>({
    resolver: async (...asked) =>
      (await loadResolver<In, Out>(schema as unknown as Loads<In, Out>))(...asked),
    defaultValues,
    mode: 'onTouched',
  });
  const [refusal, setRefusal] = useState<string | null>(null);
  const { errors, isSubmitting, isDirty, isSubmitSuccessful } = form.formState;

  /** Name, value, error: everything that a field of ours takes. */
  const field = (name: Path<In>, options?: RegisterOptions<In, Path<In>>) => {
    const fault = get(errors, name) as FieldError | undefined;
    const words = fault?.message ?? '';
    const isFromServer = fault?.type === 'server';
    return {
      ...form.register(name, options),
      error: words === '' ? undefined : isFromServer ? words : wantedWords(words),
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
