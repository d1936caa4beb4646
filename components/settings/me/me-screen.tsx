'use client';

import { type ReactNode, useState } from 'react';
import { PageTitle } from '@/components/ui/page-title';
import { SectionOpener } from '@/components/ui/section-opener';
import type { SessionView } from '@/lib/schemas/account';
import type { MailPreferences } from '@/lib/schemas/mail';
import { MailSwitches } from './mail-switches';
import { OwnData } from './own-data';
import { PasswordForm } from './password-form';
import { ProfileForm } from './profile-form';
import { SessionList } from './session-list';

interface MeScreenProps {
  name: string;
  email: string;
  sessions: SessionView[];
  mail: MailPreferences;
  /** Further sections on how the person signs in. */
  children?: ReactNode;
}

/** What is the person's own: name, password, sessions, mail. */
export function MeScreen({ name, email, sessions, mail, children }: MeScreenProps) {
  const [changes, setChanges] = useState(0);
  return (
    <>
      <PageTitle title="You" context="The same in all your collaborations" />
      <div className="grid gap-x-14 gap-y-10 lg:grid-cols-2">
        <section className="min-w-0">
          <SectionOpener title="Profile" />
          <ProfileForm initial={name} email={email} />
        </section>
        <section className="min-w-0">
          <SectionOpener title="Mail" context="each message can stop its kind too" />
          <MailSwitches initial={mail} />
        </section>
        <section className="min-w-0">
          <SectionOpener title="Password" />
          <PasswordForm onChanged={() => setChanges(changes + 1)} />
        </section>
        <section className="min-w-0">
          <SectionOpener title="Sessions" context="where you are signed in" />
          <SessionList initial={sessions} stamp={changes} />
        </section>
        {children}
        <section className="min-w-0">
          <SectionOpener title="Your data" />
          <OwnData />
        </section>
      </div>
    </>
  );
}
