import { CheckboxField } from '@/components/ui/checkbox-field';
import type { Role } from '@/lib/schemas/common';

export const roleWords: Record<Role, string> = {
  owner: 'owner',
  statistician: 'statistician',
  collaborator: 'collaborator',
  author: 'author',
  student: 'student',
};

const roleNotes: Record<Role, string> = {
  owner: 'invites people, changes roles and everything below',
  statistician: 'defines populations, priors and cutoffs for all',
  collaborator: 'brings and leads surveys, and combines them',
  author: 'freezes results, and invites students',
  student: 'copies analyses, re-runs them and compares',
};

interface RoleFieldsProps {
  legend: string;
  roles: Role[];
  onChange(roles: Role[]): void;
  /** Roles that this person may give. */
  offered: readonly Role[];
}

/** One box a role; a person may hold several. */
export function RoleFields({ legend, roles, onChange, offered }: RoleFieldsProps) {
  return (
    <fieldset className="flex flex-col gap-2">
      <legend className="mb-1 text-[14px] text-ink3">{legend}</legend>
      {offered.map((role) => (
        <CheckboxField
          key={role}
          label={roleWords[role]}
          hint={roleNotes[role]}
          checked={roles.includes(role)}
          onChange={(event) =>
            onChange(
              event.target.checked ? [...roles, role] : roles.filter((held) => held !== role),
            )
          }
        />
      ))}
    </fieldset>
  );
}
