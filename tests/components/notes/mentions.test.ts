import { createElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { changesOf } from '@/components/log/changes';
import {
  mentionAt,
  mentionedIn,
  putMention,
  splitMentions,
  suggestPeople,
} from '@/components/notes/mentions';
import { NoteText } from '@/components/notes/note-text';

const ann = { id: '1', name: 'Ann' };
const annLee = { id: '2', name: 'Ann Lee' };
const rene = { id: '3', name: 'René Müller' };
const hostile = { id: '4', name: '<img src=x onerror=alert(1)>' };
const people = [ann, annLee, rene, hostile];

describe('names in a note', () => {
  it('are looked for behind an @ that begins a word, and nowhere else', () => {
    expect(mentionAt('look @an', 8)).toEqual({ start: 5, typed: 'an' });
    expect(mentionAt('(@', 2)).toEqual({ start: 1, typed: '' });
    expect(mentionAt('ann@observatory', 15)).toBeNull();
    expect(mentionAt('@ann\nnext', 9)).toBeNull();
  });

  it('are suggested by any of their parts, with or without accents', () => {
    expect(suggestPeople(people, 'mul').map(({ id }) => id)).toEqual(['3']);
    expect(suggestPeople(people, 'Ann').map(({ id }) => id)).toEqual(['1', '2']);
  });

  it('take the place of what was typed, and the cursor stands behind them', () => {
    const put = putMention('see @an now', { start: 4, typed: 'an' }, annLee.name);
    expect(put.text).toBe('see @Ann Lee now');
    expect(putMention('@an', { start: 0, typed: 'an' }, ann.name)).toEqual({
      text: '@Ann ',
      cursor: 5,
    });
  });

  it('are read longest first, so that Ann is not named by Ann Lee', () => {
    expect(mentionedIn('@Ann Lee and @René Müller', people, new Set())).toEqual(['2', '3']);
    expect(splitMentions('@Ann Lee!', people)[0].person).toEqual(annLee);
  });

  it('mean the person that was picked where two have one name', () => {
    const twins = [ann, { id: '9', name: 'Ann' }];
    expect(mentionedIn('@Ann', twins, new Set(['9']))).toEqual(['9']);
  });

  it('and all other words are text, never markup', () => {
    const body = `@${hostile.name} <script>alert(1)</script> &amp;`;
    const html = renderToStaticMarkup(createElement(NoteText, { body, mentions: [hostile] }));
    expect(html).not.toMatch(/<(img|script)\b/);
    expect(html).toContain('&lt;script&gt;');
    expect(html).toContain('&amp;amp;');
  });
});

describe('changesOf(details)', () => {
  it('says each value before and after, in words', () => {
    const before = { needsTwoPeople: false, timeZone: 'UTC' };
    const after = { needsTwoPeople: true, timeZone: 'Europe/Vienna' };
    expect(changesOf({ before, after })).toEqual([
      { name: 'needs two people', before: 'no', after: 'yes' },
      { name: 'time zone', before: 'UTC', after: 'Europe/Vienna' },
    ]);
    expect(changesOf({ before: ['student'], after: ['author', 'student'] })).toEqual([
      { name: '', before: 'student', after: 'author, student' },
    ]);
    expect(changesOf({ via: 'session' })).toEqual([]);
  });
});
