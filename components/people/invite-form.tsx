'use client';

import { invite } from '@/components/hooks/use-people';
import { Button } from '@/components/ui/button';
import { LeaveGuard } from '@/components/ui/form/leave-guard';
import { useSchemaForm } from '@/components/ui/form/use-schema-form';
import { Notice } from '@/components/ui/notice';
import { TextField } from '@/components/ui/text-field';
import type { Role } from '@/lib/schemas/common';
import { RoleFields } from './role-fields';

const loadSchema = async () => (await import('@/lib/schemas/people')).inviteSchema;

interface InviteFormProps {
  collaboration: string;
  /** Roles that this person may give. */
  offered: readonly Role[];
  onInvited(email: string): void;
}

/** An address and roles; the message goes out when it is sent. */
export function InviteForm({ collaboration, offered, onInvited }: InviteFormProps) {
  const { form, field, submit, refusal, isBusy, isUnsaved } = useSchemaForm(loadSchema, {
    email: '',
    roles: ['student'] as Role[],
  });
  const roles = form.watch('roles');
  return (
    <form
      noValidate
      className="flex max-w-[440px] flex-col gap-4"
      onSubmit={submit(async (values) => {
        await invite(collaboration, values.email, values.roles);
        form.reset();
        onInvited(values.email);
      })}
    >
      <LeaveGuard isUnsaved={isUnsaved} />
      <TextField label="E-mail of a colleague" type="email" required {...field('email')} />
      <RoleFields
        legend="Invite as"
        roles={roles}
        onChange={(next) => form.setValue('roles', next, { shouldDirty: true })}
        offered={offered}
      />
      {refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />}
      <div>
        <Button
          type="submit"
          variant="primary"
          icon="mail"
          isBusy={isBusy}
          disabledReason={roles.length === 0 ? 'Choose at least one role' : undefined}
        >
          Invite
        </Button>
      </div>
    </form>
  );
}
