'use client';

import Link from 'next/link';
import { useOpenJobs } from '@/components/hooks/use-jobs';
import { endSession } from '@/components/hooks/use-sign-in';
import { Icon } from '@/components/ui/icon';
import { Menu, MenuAction, MenuLink, MenuRule } from '@/components/ui/menu';
import { NavLink } from '@/components/ui/nav-link';
import type { Theme } from '@/components/ui/theme';
import { ThemeSwitch } from '@/components/ui/theme-switch';
import { TopBar } from '@/components/ui/top-bar';
import type { JobView } from '@/lib/schemas/jobs';
import type { Me } from '@/lib/schemas/people';

interface LabBarProps {
  me: Me;
  /** Slug of the collaboration whose pages these are. */
  current: string;
  theme: Theme;
}

const initialsOf = (name: string) =>
  name
    .split(/\s+/)
    .map((part) => part[0] ?? '')
    .join('')
    .slice(0, 2)
    .toUpperCase();

function wordsOf({ kind, subject }: JobView): string {
  if (kind === 'compute-maps') return `Maps of ${subject}`;
  return kind === 'compute-run' ? `Run of ${subject}` : subject;
}

function RunningJobs({ collaboration }: { collaboration: string }) {
  const jobs = useOpenJobs(collaboration);
  if (jobs.length === 0) return null;
  return (
    <Menu
      look="quiet"
      align="right"
      accessibleName={`${jobs.length} jobs running or waiting`}
      label={
        <span className="inline-flex items-center gap-1.5 whitespace-nowrap text-ink">
          <Icon name="running" size={15} />
          {jobs.length} <span className="max-md:sr-only">running</span>
        </span>
      }
    >
      {jobs.map((job) => (
        <MenuLink
          key={job.id}
          href={
            job.kind === 'compute-maps'
              ? `/${collaboration}/surveys`
              : `/${collaboration}/analyses/${job.subject.split(',')[0]}`
          }
        >
          {wordsOf(job)}
          {job.total > 0 && `, ${job.done} of ${job.total}`}
        </MenuLink>
      ))}
    </Menu>
  );
}

/** The bar over every page of a collaboration. */
export function LabBar({ me, current, theme }: LabBarProps) {
  const base = `/${current}`;
  const name = me.collaborations.find((one) => one.slug === current)?.name ?? current;
  return (
    <TopBar
      brandHref={base}
      switcher={
        <Menu
          label={<span className="max-w-[14ch] truncate md:max-w-[22ch]">{name}</span>}
          accessibleName={`Collaboration: ${name}`}
        >
          {me.collaborations.map((one) => (
            <MenuLink key={one.slug} href={`/${one.slug}`} isCurrent={one.slug === current}>
              {one.name}
            </MenuLink>
          ))}
          <MenuRule />
          <MenuLink href={`${base}/people`}>People and invitations</MenuLink>
          <MenuLink href="/welcome">Start another collaboration</MenuLink>
        </Menu>
      }
      nav={
        <>
          <NavLink href={base} exact>
            Overview
          </NavLink>
          <NavLink href={`${base}/surveys`}>Surveys</NavLink>
          <NavLink href={`${base}/stars`}>Stars</NavLink>
          <NavLink href={`${base}/populations`}>Populations</NavLink>
          <NavLink href={`${base}/analyses`}>Analyses</NavLink>
          <NavLink href={`${base}/forecasts`}>Forecasts</NavLink>
        </>
      }
      tools={
        <>
          <RunningJobs collaboration={current} />
          <Menu
            look="round"
            align="right"
            label={initialsOf(me.person.name)}
            accessibleName={`Your menu, ${me.person.name}`}
          >
            <div className="px-3 py-2">
              <p className="font-semibold">{me.person.name}</p>
              <p className="text-[13px] text-ink3">{me.person.email}</p>
            </div>
            <MenuRule />
            <div className="px-3 py-2">
              <ThemeSwitch initial={theme} />
            </div>
            <MenuRule />
            <MenuLink href={`${base}/me/tokens`}>API tokens</MenuLink>
            <MenuAction onSelect={() => void endSession()}>Sign out</MenuAction>
          </Menu>
        </>
      }
    />
  );
}

/** A quiet line at the foot of each page. */
export function LabFoot({ collaboration }: { collaboration: string }) {
  return (
    <footer className="mx-auto mt-14 max-w-[1440px] px-[22px] pb-8 text-[13px] text-ink3 lg:px-10 print:hidden">
      <Link href={`/${collaboration}/people`}>People</Link>
      <span className="mx-2">·</span>
      <a href="/api/v1/openapi.json">API</a>
    </footer>
  );
}
