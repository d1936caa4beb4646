import { LinkTabs } from '@/components/ui/link-tabs';

interface StarTabsProps {
  collaboration: string;
  current: 'stars' | 'overlaps' | 'ages' | 'samples';
  /** Of the whole collaboration: the same on each of the pages. */
  stars: number;
  undecided: number;
}

/** The parts of the sky: stars, pairs to decide, adopted values, saved selections. */
export function StarTabs({ collaboration, current, stars, undecided }: StarTabsProps) {
  const base = `/${collaboration}/stars`;
  return (
    <LinkTabs
      label="Parts of the stars"
      tabs={[
        { href: base, label: 'Stars', count: stars, isCurrent: current === 'stars' },
        {
          href: `${base}/overlaps`,
          label: 'Overlaps',
          count: undecided,
          isCurrent: current === 'overlaps',
        },
        { href: `${base}/ages`, label: 'Ages and distances', isCurrent: current === 'ages' },
        { href: `${base}/samples`, label: 'Samples', isCurrent: current === 'samples' },
      ]}
    />
  );
}
