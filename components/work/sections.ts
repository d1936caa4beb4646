export interface Section {
  label: string;
  /** Below the collaboration's address; empty for the overview. */
  path: string;
  /** Other words under which somebody may look for it. */
  also?: string;
}

/** In the bar, in the order of the work. */
export const mainSections: Section[] = [
  { label: 'Overview', path: '', also: 'home start lead limit' },
  { label: 'Surveys', path: 'surveys', also: 'targets curves import' },
  { label: 'Stars', path: 'stars', also: 'hosts ages distances' },
  { label: 'Populations', path: 'populations', also: 'distribution indices cutoffs' },
  { label: 'Analyses', path: 'analyses', also: 'runs limits results' },
  { label: 'Forecasts', path: 'forecasts', also: 'planned survey' },
  { label: 'Releases', path: 'releases', also: 'frozen runs, bundles, links for guests' },
];

/** Behind "More". */
export const moreSections: Section[] = [
  { label: 'Candidates', path: 'candidates', also: 'vetting companions background epochs' },
  { label: 'Overlaps', path: 'stars/overlaps', also: 'pairs the same star' },
  { label: 'Ages and distances', path: 'stars/ages', also: 'adopted values tables' },
  { label: 'Samples', path: 'stars/samples', also: 'selection of stars' },
  { label: 'Maps', path: 'maps', also: 'completeness store' },
  { label: 'Cooling relations', path: 'cooling', also: 'tracks tables start' },
  { label: 'Compare', path: 'compare', also: 'two analyses side by side' },
  { label: 'Activity', path: 'activity', also: 'news notes mentions what happened' },
  { label: 'People', path: 'people', also: 'members roles invitations' },
  { label: 'Settings', path: 'settings', also: 'name address rule level time zone archive' },
  { label: 'Log', path: 'log', also: 'audit who did what export' },
];

export const sectionHref = (collaboration: string, { path }: Section) =>
  path === '' ? `/${collaboration}` : `/${collaboration}/${path}`;
