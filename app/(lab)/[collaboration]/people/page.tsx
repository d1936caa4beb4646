import type { Metadata } from 'next';
import { currentActor } from '@/app/session';
import { InvitationPanel } from '@/components/people/invitation-panel';
import { MemberTable } from '@/components/people/member-table';
import { PageTitle } from '@/components/ui/page-title';
import { SectionOpener } from '@/components/ui/section-opener';
import { may } from '@/lib/access/permissions';
import { type Role, roleSchema } from '@/lib/schemas/common';
import { listInvitations } from '@/lib/services/invitations';
import { listMembers } from '@/lib/services/members';

export const metadata: Metadata = { title: 'People' };

export default async function PeoplePage({
  params,
}: {
  params: Promise<{ collaboration: string }>;
}) {
  const actor = await currentActor((await params).collaboration);
  const { members } = await listMembers(actor);
  const offered: readonly Role[] = may(actor, 'invite-any-role')
    ? roleSchema.options
    : may(actor, 'invite')
      ? ['student']
      : [];
  const invitations = offered.length > 0 ? (await listInvitations(actor)).invitations : [];
  return (
    <>
      <PageTitle
        title="People"
        context={`${members.length} in this collaboration; nobody else sees what is in it`}
      />
      <div className="mt-2 grid gap-x-14 gap-y-10 lg:grid-cols-[minmax(0,3fr)_minmax(0,2fr)]">
        <section className="min-w-0">
          <SectionOpener title="Members" context="a person may hold several roles" />
          <MemberTable collaboration={actor.collaboration} initial={members} />
        </section>
        {offered.length > 0 && (
          <section className="min-w-0">
            <SectionOpener title="Invite" context="valid 14 days, once" />
            <InvitationPanel
              collaboration={actor.collaboration}
              initial={invitations}
              offered={offered}
            />
          </section>
        )}
      </div>
    </>
  );
}
