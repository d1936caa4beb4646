import { describe, expect, it } from 'vitest';
import { entriesHere } from '@/components/search/entries';
import { wordEntries } from '@/components/search/word-entries';
import { faultWords, wantedWords } from '@/components/ui/form/field-words';
import { endedSentence, jobHref, jobTitle } from '@/components/work/job-words';
import { createTokenSchema, signUpSchema } from '@/lib/schemas/people';

const refusedWords = (schema: typeof signUpSchema | typeof createTokenSchema, value: unknown) =>
  (schema.safeParse(value).error?.issues ?? []).map(({ message }) => wantedWords(message));

describe('what a field says', () => {
  it('comes from the words of its schema', () => {
    const account = { name: ' ', email: 'a@b.example', password: 'short' };
    expect(refusedWords(signUpSchema, account)).toEqual([
      'Expected something to read',
      'Expected at least 15 characters',
    ]);
  });

  it('never shows the words of a library', () => {
    const token = { name: 'x', scopes: ['read'], days: 0 };
    expect(refusedWords(createTokenSchema, token)).toEqual(['Expected at least 1']);
    expect(refusedWords(createTokenSchema, { ...token, days: Number.NaN })).toEqual([
      'Expected a number',
    ]);
  });

  it('tells what the server found there', () => {
    expect(
      faultWords({
        code: 'too-long',
        item: 'name',
        found: '61 characters',
        expected: 'at most 60',
      }),
    ).toBe('Expected at most 60, found 61 characters');
  });
});

describe('running work in words', () => {
  const job = {
    kind: 'compute-maps',
    subject: 'CURLEW',
    page: 'surveys/curlew',
    status: 'done',
  } as Parameters<typeof endedSentence>[0];

  it('names what it is, where it stands and how it ended', () => {
    expect(jobTitle(job)).toBe('Maps of CURLEW');
    expect(jobHref('team', job)).toBe('/team/surveys/curlew');
    expect(endedSentence(job)).toEqual({ tone: 'ok', title: 'Maps of CURLEW: done.' });
    expect(endedSentence({ ...job, status: 'running' })).toBeUndefined();
  });
});

describe('places without a question to the server', () => {
  const actions = [{ label: 'New analysis', path: 'analyses/new' }];
  const titles = (words: string) => entriesHere('team', actions, words).map(({ title }) => title);

  it('are found by the beginning of any of their words', () => {
    expect(titles('ana')).toEqual(['New analysis', 'Analyses', 'Compare']);
    expect(titles('vett')).toEqual(['Candidates']);
    expect(titles('nalys')).toEqual([]);
    expect(titles('')).toContain('Overview');
  });

  it('include the words that the help explains', () => {
    expect(wordEntries('upper').map(({ href }) => href)).toContain('/help/upper-limit');
    expect(wordEntries('')).toEqual([]);
  });
});
