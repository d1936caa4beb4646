'use client';

import { createToken } from '@/components/hooks/use-people';
import { Button } from '@/components/ui/button';
import { CheckboxField } from '@/components/ui/checkbox-field';
import { useSchemaForm } from '@/components/ui/form/use-schema-form';
import { Notice } from '@/components/ui/notice';
import { NumberField } from '@/components/ui/number-field';
import { TextField } from '@/components/ui/text-field';

const loadSchema = async () => (await import('@/lib/schemas/people')).createTokenSchema;

const scopes = [
  { value: 'read', label: 'read', hint: 'surveys, maps, populations, analyses, results' },
  { value: 'write', label: 'write', hint: 'surveys, files, populations, analyses' },
  { value: 'run', label: 'run', hint: 'start maps and runs' },
] as const;

interface TokenFormProps {
  collaboration: string;
  /** The token itself, which is shown this once. */
  onMade(token: string): void;
}

/** What a new token is for, what it may, and when it ends. */
export function TokenForm({ collaboration, onMade }: TokenFormProps) {
  const { form, field, submit, refusal, isBusy } = useSchemaForm(loadSchema, {
    name: '',
    scopes: ['read'],
    days: 90,
  });
  const chosen = form.watch('scopes');
  return (
    <form
      noValidate
      className="flex max-w-[440px] flex-col gap-4"
      onSubmit={submit(async (values) => {
        const { token } = await createToken(collaboration, values);
        form.reset();
        onMade(token);
      })}
    >
      <TextField label="What it is for" required {...field('name')} />
      <fieldset className="flex flex-col gap-2">
        <legend className="mb-1 text-[14px] text-ink3">It may</legend>
        {scopes.map(({ value, label, hint }) => (
          <CheckboxField
            key={value}
            label={label}
            hint={hint}
            checked={chosen.includes(value)}
            onChange={(event) =>
              form.setValue(
                'scopes',
                event.target.checked ? [...chosen, value] : chosen.filter((held) => held !== value),
              )
            }
          />
        ))}
      </fieldset>
      <NumberField
        label="It ends after"
        unit="days"
        required
        {...field('days', { valueAsNumber: true })}
      />
      {refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />}
      <div>
        <Button
          type="submit"
          variant="primary"
          icon="key"
          isBusy={isBusy}
          disabledReason={chosen.length === 0 ? 'Choose what it may do' : undefined}
        >
          Make a token
        </Button>
      </div>
    </form>
  );
}
