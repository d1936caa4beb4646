'use client';

import { usePathname } from 'next/navigation';
import { Suspense } from 'react';
import { useJobs } from '@/components/hooks/use-jobs';
import { endSession } from '@/components/hooks/use-sign-in';
import type { BeginAction } from '@/components/search/entries';
import { FindButton } from '@/components/search/find-button';
import { Link } from '@/components/ui/link';
import { Menu, MenuAction, MenuChoice, MenuLink, MenuNote, MenuRule } from '@/components/ui/menu';
import { NavLink } from '@/components/ui/nav-link';
import type { Theme } from '@/components/ui/theme';
import { themeChoices } from '@/components/ui/theme-switch';
import { Toaster } from '@/components/ui/toaster';
import { TopBar } from '@/components/ui/top-bar';
import { useTheme } from '@/components/ui/use-theme';
import { LostBanner } from '@/components/work/lost-banner';
import { mainSections, moreSections, sectionHref } from '@/components/work/sections';
import { useEndedJobs } from '@/components/work/use-ended-jobs';
import { WorkMenu } from '@/components/work/work-menu';
import type { Me } from '@/lib/schemas/people';

interface LabBarProps {
  me: Me;
  /** Slug of the collaboration whose pages these are. */
  current: string;
  theme: Theme;
  /** What the person may begin here. */
  actions: BeginAction[];
}

const initialsOf = (name: string) =>
  name
    .split(/\s+/)
    .map((part) => part[0] ?? '')
    .join('')
    .slice(0, 2)
    .toUpperCase();

function CollaborationMenu({ me, current }: Pick<LabBarProps, 'me' | 'current'>) {
  const name = me.collaborations.find((one) => one.slug === current)?.name ?? current;
  return (
    <Menu label={name} accessibleName={`Collaboration: ${name}`}>
      {me.collaborations.map((one) => (
        <MenuLink key={one.slug} href={`/${one.slug}`} isCurrent={one.slug === current}>
          {one.name}
        </MenuLink>
      ))}
      <MenuRule />
      <MenuLink href={`/${current}/people`}>People and invitations</MenuLink>
      <MenuLink href={`/${current}/settings`}>Settings</MenuLink>
      <MenuLink href="/welcome">Start another collaboration</MenuLink>
    </Menu>
  );
}

function OwnMenu({ me, current, theme }: Omit<LabBarProps, 'actions'>) {
  const [chosen, choose] = useTheme(theme);
  const { name, email } = me.person;
  return (
    <Menu look="round" align="right" label={initialsOf(name)} accessibleName={`Your menu, ${name}`}>
      <MenuNote>
        <b className="block text-ink text-note">{name}</b>
        {email}
      </MenuNote>
      <MenuRule />
      <MenuChoice
        label="Light or dark"
        value={chosen}
        onChange={choose}
        options={themeChoices.map((choice) => ({
          ...choice,
          label: choice.value === 'system' ? 'as the system' : choice.label,
        }))}
      />
      <MenuRule />
      <MenuLink href={`/${current}/me`}>Profile, sessions and mail</MenuLink>
      <MenuLink href={`/${current}/me/tokens`}>API tokens</MenuLink>
      <MenuAction onSelect={() => void endSession()}>Sign out</MenuAction>
    </Menu>
  );
}

/** Main sections in a row; the others behind one word, or below them where the bar is folded. */
function LabNav({ current }: { current: string }) {
  const pathname = usePathname();
  return (
    <>
      {mainSections.map((section) => (
        <NavLink
          key={section.path}
          href={sectionHref(current, section)}
          exact={section.path === ''}
        >
          {section.label}
        </NavLink>
      ))}
      <div className="hidden lg:flex lg:items-center lg:px-1">
        <Menu label="More" look="plain">
          {moreSections.map((section) => {
            const href = sectionHref(current, section);
            return (
              <MenuLink key={section.path} href={href} isCurrent={pathname === href}>
                {section.label}
              </MenuLink>
            );
          })}
        </Menu>
      </div>
      <div className="grid grid-cols-2 gap-x-4 border-rule border-t pt-1 lg:hidden">
        {moreSections.map((section) => (
          <NavLink key={section.path} href={sectionHref(current, section)} exact>
            {section.label}
          </NavLink>
        ))}
      </div>
    </>
  );
}

/** The bar over every page of a collaboration, with what it says of work and of the connection. */
export function LabBar({ me, current, theme, actions }: LabBarProps) {
  const { jobs, lost, mutate } = useJobs(current);
  useEndedJobs(current, jobs);
  return (
    <>
      <TopBar
        brandHref={`/${current}`}
        switcher={<CollaborationMenu me={me} current={current} />}
        nav={<LabNav current={current} />}
        tools={
          <>
            <FindButton collaboration={current} actions={actions} />
            <WorkMenu collaboration={current} jobs={jobs} onChanged={() => void mutate()} />
            <OwnMenu me={me} current={current} theme={theme} />
          </>
        }
      />
      <Suspense>
        <LostBanner lost={lost} />
      </Suspense>
      <Toaster />
    </>
  );
}

/** A quiet line at the foot of each page. */
export function LabFoot({ collaboration }: { collaboration: string }) {
  return (
    <footer className="mx-auto mt-14 max-w-[1440px] px-[22px] pb-8 text-[13px] text-ink3 lg:px-10 print:hidden">
      <Link href={`/${collaboration}/people`}>People</Link>
      <span className="mx-2">·</span>
      <Link href={`/${collaboration}/activity`}>Activity</Link>
      <span className="mx-2">·</span>
      <Link href={`/${collaboration}/exercises`}>Exercises</Link>
      <span className="mx-2">·</span>
      <Link href={`/${collaboration}/settings`}>Settings</Link>
      <span className="mx-2">·</span>
      <Link href="/help">Help</Link>
      <span className="mx-2">·</span>
      <a href="/api/v1/openapi.json">API</a>
    </footer>
  );
}
