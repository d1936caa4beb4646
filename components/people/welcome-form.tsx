'use client';

import { createCollaboration } from '@/components/hooks/use-sign-in';
import { Button } from '@/components/ui/button';
import { useSchemaForm } from '@/components/ui/form/use-schema-form';
import { Notice } from '@/components/ui/notice';
import { TextField } from '@/components/ui/text-field';

const loadSchema = async () => (await import('@/lib/schemas/people')).createCollaborationSchema;

const slugFrom = (name: string) =>
  name
    .toLowerCase()
    .normalize('NFKD')
    .replace(/[^a-z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .slice(0, 39);

/** Starts a collaboration, whose owner the person becomes. */
export function WelcomeForm() {
  const { form, field, submit, refusal, isBusy } = useSchemaForm(loadSchema, {
    name: '',
    slug: '',
  });
  const isOwnSlug = form.formState.dirtyFields.slug === true;
  return (
    <form
      noValidate
      className="flex flex-col gap-4"
      onSubmit={submit(async (values) => {
        const { slug } = await createCollaboration(values);
        window.location.assign(`/${slug}`);
      })}
    >
      <TextField
        label="Name of the collaboration"
        required
        {...field('name', {
          // The address follows the name until it is typed itself.
          onChange: (event) => {
            if (!isOwnSlug) form.resetField('slug', { defaultValue: slugFrom(event.target.value) });
          },
        })}
      />
      <TextField
        label="Its address"
        hint="Lower-case letters, digits and hyphens."
        required
        {...field('slug')}
      />
      {refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />}
      <Button type="submit" variant="primary" isWide isBusy={isBusy}>
        Start the collaboration
      </Button>
    </form>
  );
}
