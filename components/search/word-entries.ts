import { helpWordNames, helpWords } from '@/lib/help';
import { type Entry, startsAWord } from './entries';

const MOST = 5;

/** Words that the help explains; loaded with the search, not with the page. */
export function wordEntries(words: string): Entry[] {
  if (words === '') return [];
  return helpWordNames
    .filter((word) => startsAWord(helpWords[word].title, words))
    .slice(0, MOST)
    .map((word) => ({
      id: `word-${word}`,
      group: 'Words',
      title: helpWords[word].title,
      note: 'what it means',
      href: `/help/${word}`,
    }));
}
