import { createElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { DepositLine } from '@/components/releases/deposit-line';
import { DepositPart } from '@/components/releases/deposit-part';
import type { DepositView } from '@/lib/schemas/deposits';

const none: DepositView = {
  state: 'none',
  repository: 'repository.example.org',
  doi: null,
  address: null,
  isPractice: false,
  askedBy: null,
  askedAt: null,
  publishedAt: null,
  stage: '',
  done: 0,
  total: 0,
  fault: null,
  canAsk: true,
  whyNot: null,
};
const textOf = (given: Partial<DepositView>) =>
  renderToStaticMarkup(
    createElement(DepositPart, {
      collaboration: 'heron',
      release: { id: 'a', key: 'R-4' },
      initial: { ...none, ...given },
    }),
  );

describe('the copy of a release in an open repository', () => {
  it('is offered to whoever may send it, and says to the others why not', () => {
    expect(textOf({})).toContain('Send it');
    const other = textOf({ canAsk: false, whyNot: 'An author or an owner can send it' });
    expect(other).not.toContain('<button');
    expect(other).toContain('An author or an owner can send it.');
  });

  it('shows how far it is, and a reserved DOI without a link', () => {
    const doi = '10.99999/a1';
    const html = textOf({
      state: 'running',
      stage: 'upload',
      done: 3,
      total: 14,
      doi,
      canAsk: false,
    });
    expect(html).toContain('3 of 14 files have arrived.');
    expect(html).toContain(`doi:${doi} is reserved`);
    expect(html).not.toContain('href');
  });

  it('says why it failed and offers to send it again', () => {
    const html = textOf({ state: 'failed', fault: 'The repository refused with 400' });
    expect(html).toContain('The repository refused with 400.');
    expect(html).toContain('Send it again');
  });

  it('links a DOI that resolves, and no practice one', () => {
    const published = {
      state: 'published',
      publishedAt: '2026-11-03T10:00:00Z',
      canAsk: false,
    } as const;
    expect(textOf({ ...published, doi: '10.99999/a1', askedBy: 'R. Castellan' })).toContain(
      'href="https://doi.org/10.99999/a1"',
    );
    const practice = { doi: '10.5072/practice.1', isPractice: true };
    expect(textOf({ ...published, ...practice })).not.toContain('doi.org');
    const line = renderToStaticMarkup(
      createElement(DepositLine, { deposit: { ...practice, address: null } }),
    );
    expect(line).toContain('leads nowhere');
    expect(line).not.toContain('href');
  });
});
