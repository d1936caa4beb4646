'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { useEditing } from '@/components/hooks/use-editing';
import {
  changeRoles,
  removeMember,
  suspendMember,
  useMembers,
} from '@/components/hooks/use-people';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { ChangedNotice } from '@/components/ui/form/changed-notice';
import { Notice } from '@/components/ui/notice';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { TextAction } from '@/components/ui/text-action';
import { useMoment } from '@/components/ui/time-zone';
import type { Role } from '@/lib/schemas/common';
import type { MemberView } from '@/lib/schemas/people';
import { RoleFields, roleWords } from './role-fields';

interface RoleDialogProps {
  collaboration: string;
  member: MemberView | null;
  onClose(): void;
  onChanged(): void;
}

function RoleDialog({ collaboration, member, onClose, onChanged }: RoleDialogProps) {
  const [roles, setRoles] = useState<Role[]>(member?.roles ?? []);
  const [refusal, setRefusal] = useState<string | null>(null);
  const apply = async (work: () => Promise<unknown>) => {
    try {
      await work();
      onChanged();
      onClose();
    } catch (reason) {
      setRefusal(sentenceOf(reason));
    }
  };
  const editing = useEditing<Role[]>(member?.roles ?? []);
  const saveRoles = async (id: string) => {
    setRefusal(null);
    try {
      await editing.attempt(roles, async (opened) => {
        await changeRoles(collaboration, id, opened, roles);
        onChanged();
        onClose();
      });
    } catch (reason) {
      setRefusal(sentenceOf(reason));
    }
  };
  if (!member) return null;
  return (
    <Dialog
      isOpen
      onClose={onClose}
      title={`Roles of ${member.person.name}`}
      actions={
        <>
          <Button
            variant="primary"
            disabledReason={roles.length === 0 ? 'At least one role remains' : undefined}
            onClick={() => void saveRoles(member.id)}
          >
            Save the roles
          </Button>
          {member.can.suspend && (
            <Button
              onClick={() =>
                void apply(() =>
                  suspendMember(collaboration, member.id, member.suspendedAt === null),
                )
              }
            >
              {member.suspendedAt === null ? 'Suspend' : 'Let in again'}
            </Button>
          )}
          {member.can.remove && (
            <Button onClick={() => void apply(() => removeMember(collaboration, member.id))}>
              Remove from the collaboration
            </Button>
          )}
        </>
      }
    >
      <RoleFields
        legend="May act as"
        roles={roles}
        onChange={setRoles}
        offered={Object.keys(roleWords) as Role[]}
      />
      <div className="mt-4 empty:hidden">
        <ChangedNotice
          editing={editing}
          words={(held) => ({ Roles: held.map((role) => roleWords[role]).join(', ') })}
          onTake={setRoles}
          onKeep={() => void saveRoles(member.id)}
        />
      </div>
      {member.can.suspend && (
        <p className="mt-4 text-ink3 text-note">
          {member.suspendedAt === null
            ? 'Suspending ends their access here at once; what they made stays, and they can be let in again.'
            : 'Suspended: they cannot open this collaboration.'}
        </p>
      )}
      {refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />}
    </Dialog>
  );
}

/** Everybody of the collaboration with their roles and the surveys that they lead. */
export function MemberTable({
  collaboration,
  initial,
}: {
  collaboration: string;
  initial: MemberView[];
}) {
  const { data: members = initial, mutate } = useMembers(collaboration, initial);
  const moment = useMoment();
  const [chosen, setChosen] = useState<MemberView | null>(null);
  return (
    <>
      <Table caption="People of the collaboration">
        <TableHead>
          <Row>
            <HeadCell>person</HeadCell>
            <HeadCell className="max-md:hidden">role</HeadCell>
            <HeadCell className="max-md:hidden">leads</HeadCell>
            <HeadCell className="max-md:hidden">since</HeadCell>
            <HeadCell>
              <span className="sr-only">change</span>
            </HeadCell>
          </Row>
        </TableHead>
        <TableBody>
          {members.map((member) => (
            <Row key={member.id}>
              <Cell>
                <span className="font-semibold">{member.person.name}</span>
                {member.suspendedAt !== null && (
                  <span className="ml-2 text-[13px] text-warn">suspended</span>
                )}
                <span className="block text-[13px] text-ink3">{member.person.email}</span>
                <span className="block text-[13px] md:hidden">
                  {member.roles.map((role) => roleWords[role]).join(', ')}
                </span>
              </Cell>
              <Cell className="max-md:hidden">
                {member.roles.map((role) => roleWords[role]).join(', ')}
              </Cell>
              <Cell className="max-md:hidden">{member.leads.join(', ') || '–'}</Cell>
              <Cell className="whitespace-nowrap max-md:hidden">
                {moment(member.joinedAt, 'day')}
              </Cell>
              <Cell>
                {member.can.changeRoles && (
                  <TextAction onClick={() => setChosen(member)}>
                    Change<span className="sr-only"> the roles of {member.person.name}</span>
                  </TextAction>
                )}
              </Cell>
            </Row>
          ))}
        </TableBody>
      </Table>
      <RoleDialog
        key={chosen?.id}
        collaboration={collaboration}
        member={chosen}
        onClose={() => setChosen(null)}
        onChanged={() => void mutate()}
      />
    </>
  );
}
