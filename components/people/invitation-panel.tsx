'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { resendInvitation, revokeInvitation, useInvitations } from '@/components/hooks/use-people';
import { Notice } from '@/components/ui/notice';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { TextAction } from '@/components/ui/text-action';
import { useMoment } from '@/components/ui/time-zone';
import type { Role } from '@/lib/schemas/common';
import type { InvitationView } from '@/lib/schemas/people';
import { InviteForm } from './invite-form';
import { roleWords } from './role-fields';

interface InvitationPanelProps {
  collaboration: string;
  initial: InvitationView[];
  /** Roles that this person may give; none: the panel only lists. */
  offered: readonly Role[];
}

function mailWords(mail: InvitationView['mail']) {
  if (mail === 'failed') return <span className="block text-bad">its message did not arrive</span>;
  return mail === 'waiting' ? (
    <span className="block text-ink3">its message is on its way</span>
  ) : null;
}

/** Invites by e-mail, and shows what became of earlier invitations. */
export function InvitationPanel({ collaboration, initial, offered }: InvitationPanelProps) {
  const { data: invitations = initial, mutate } = useInvitations(collaboration, initial);
  const moment = useMoment();
  const [refusal, setRefusal] = useState<string | null>(null);
  const [sentTo, setSentTo] = useState<string | null>(null);
  const attempt = async (work: () => Promise<unknown>, sent: string | null) => {
    setRefusal(null);
    setSentTo(null);
    try {
      await work();
      setSentTo(sent);
      await mutate();
    } catch (reason) {
      setRefusal(sentenceOf(reason));
    }
  };
  return (
    <div className="flex flex-col gap-6">
      {offered.length > 0 && (
        <InviteForm
          collaboration={collaboration}
          offered={offered}
          onInvited={(email) => {
            setRefusal(null);
            setSentTo(email);
            void mutate();
          }}
        />
      )}
      {refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />}
      {sentTo !== null && (
        <Notice tone="ok" title={`An invitation is on its way to ${sentTo}.`} isAnnounced>
          It holds for 14 days and opens once.
        </Notice>
      )}
      {invitations.length > 0 && (
        <Table caption="Invitations">
          <TableHead>
            <Row>
              <HeadCell>invited</HeadCell>
              <HeadCell>as</HeadCell>
              <HeadCell>by</HeadCell>
              <HeadCell>state</HeadCell>
              <HeadCell>
                <span className="sr-only">take back</span>
              </HeadCell>
            </Row>
          </TableHead>
          <TableBody>
            {invitations.map((invitation) => (
              <Row key={invitation.id}>
                <Cell>{invitation.email}</Cell>
                <Cell>{invitation.roles.map((role) => roleWords[role]).join(', ')}</Cell>
                <Cell>{invitation.invitedBy ?? '–'}</Cell>
                <Cell>
                  {invitation.state === 'pending'
                    ? `open until ${moment(invitation.expiresAt, 'day')}`
                    : invitation.state}
                  {invitation.state === 'pending' && mailWords(invitation.mail)}
                </Cell>
                <Cell>
                  {offered.length > 0 && ['pending', 'expired'].includes(invitation.state) && (
                    <TextAction
                      onClick={() =>
                        void attempt(
                          () => resendInvitation(collaboration, invitation.id),
                          invitation.email,
                        )
                      }
                    >
                      Send again
                      <span className="sr-only"> the invitation of {invitation.email}</span>
                    </TextAction>
                  )}{' '}
                  {invitation.state === 'pending' && offered.length > 0 && (
                    <TextAction
                      onClick={() =>
                        void attempt(() => revokeInvitation(collaboration, invitation.id), null)
                      }
                    >
                      Take back
                      <span className="sr-only"> the invitation of {invitation.email}</span>
                    </TextAction>
                  )}
                </Cell>
              </Row>
            ))}
          </TableBody>
        </Table>
      )}
    </div>
  );
}
