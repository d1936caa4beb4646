import { mainSections, moreSections, type Section } from '@/components/work/sections';
import type { SearchHit } from '@/lib/schemas/search';

/** One line of the search, whatever it leads to. */
export interface Entry {
  /** Unlike any other of the list. */
  id: string;
  group: string;
  title: string;
  note: string;
  href: string;
}

/** Something the person may begin, as the server decided. */
export interface BeginAction {
  label: string;
  /** Below the collaboration's address. */
  path: string;
}

const groupOfKind: Record<SearchHit['kind'], string> = {
  survey: 'Surveys',
  star: 'Stars',
  target: 'Targets',
  population: 'Populations',
  analysis: 'Analyses',
  run: 'Runs',
  forecast: 'Forecasts',
  candidate: 'Candidates',
};

export function entryOfHit(collaboration: string, hit: SearchHit): Entry {
  return {
    id: `${hit.kind}-${hit.id}`,
    group: groupOfKind[hit.kind],
    title: hit.title,
    note: hit.note,
    href: `/${collaboration}/${hit.page}`,
  };
}

/** Whether some word of the text begins so. */
export const startsAWord = (text: string, words: string) =>
  ` ${text.toLowerCase()}`.includes(` ${words.toLowerCase()}`);

function pageEntry(collaboration: string, { label, path }: Section): Entry {
  const href = path === '' ? `/${collaboration}` : `/${collaboration}/${path}`;
  return { id: `page-${path}`, group: 'Pages', title: label, note: '', href };
}

/** Pages and beginnings that fit the words; all of them without words. */
export function entriesHere(
  collaboration: string,
  actions: readonly BeginAction[],
  words: string,
): Entry[] {
  const fits = (text: string) => words === '' || startsAWord(text, words);
  const begun = actions
    .filter(({ label }) => fits(label))
    .map(({ label, path }) => ({
      id: `begin-${path}`,
      group: 'Begin',
      title: label,
      note: '',
      href: `/${collaboration}/${path}`,
    }));
  const pages = [...mainSections, ...moreSections]
    .filter(({ label, also = '' }) => fits(`${label} ${also}`))
    .map((section) => pageEntry(collaboration, section));
  return [...begun, ...pages];
}
