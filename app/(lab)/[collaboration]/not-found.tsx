'use client';

import { usePathname } from 'next/navigation';
import { LinkButton } from '@/components/ui/link-button';
import { PageTitle } from '@/components/ui/page-title';

/** The parts of an address that are lists of their own. */
const lists = ['surveys', 'stars', 'populations', 'analyses', 'forecasts', 'candidates'];

export default function LabNotFound() {
  const [, collaboration, list] = usePathname().split('/');
  return (
    <>
      <PageTitle title="No such page" />
      <p className="max-w-[60ch] text-ink2">
        The address leads to nothing in this collaboration: it was removed, or never was. Press / to
        find something by its name.
      </p>
      <div className="mt-6 flex flex-wrap gap-2">
        {lists.includes(list) && (
          <LinkButton href={`/${collaboration}/${list}`} variant="primary">
            All {list}
          </LinkButton>
        )}
        <LinkButton href={`/${collaboration}`}>To the overview</LinkButton>
      </div>
    </>
  );
}
