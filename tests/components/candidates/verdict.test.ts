import { createElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { axisSentence, massSentence } from '@/components/candidates/estimates';
import { readVerdict, VerdictForm } from '@/components/candidates/verdict-form';
import { standingVerdict, VerdictHistory } from '@/components/candidates/verdict-history';
import { TimeZoneProvider } from '@/components/ui/time-zone';
import { giveVerdictSchema, type MassEstimate, type VerdictView } from '@/lib/schemas/candidates';
import { buildCandidate } from './build-candidate';

const formOf = (fields: Record<string, string>) => {
  const form = new FormData();
  for (const [name, value] of Object.entries(fields)) form.set(name, value);
  return form;
};

describe('the form of a verdict', () => {
  it('reads kept, measured and given values as the server takes them', () => {
    const verdict = readVerdict(
      formOf({
        status: 'confirmed',
        massFrom: 'given',
        mass: '8',
        massLower: '1',
        massUpper: '2',
        axisFrom: 'separation',
        reason: 'three epochs',
      }),
      false,
    );
    expect(giveVerdictSchema.parse(verdict)).toEqual({
      status: 'confirmed',
      probability: null,
      mass: { from: 'given', value: 8, errorLower: 1, errorUpper: 2 },
      semiMajorAxis: { from: 'separation' },
      reason: 'three epochs',
      isProposal: false,
    });
  });

  it('is refused without a value where one is given', () => {
    const fields = { status: 'ambiguous', massFrom: 'given', axisFrom: 'kept', reason: 'x' };
    expect(giveVerdictSchema.safeParse(readVerdict(formOf(fields), true)).success).toBe(false);
  });

  it('says to whoever may not decide that it is a proposal', () => {
    const markup = (vet: boolean) =>
      renderToStaticMarkup(
        createElement(VerdictForm, {
          collaboration: 'team',
          candidate: buildCandidate({ can: { vet, propose: true } }),
          onGiven: () => undefined,
        }),
      );
    expect(markup(true)).toContain('Give the verdict');
    expect(markup(false)).toContain('Send the proposal');
    expect(markup(false)).toContain('The lead of HALYARD or an owner decides');
  });
});

const verdict: VerdictView = {
  status: 'confirmed',
  probability: 1,
  massMjup: 8,
  massErrorsMjup: [1, 2],
  semiMajorAxisAu: 57.7,
  semiMajorAxisErrorsAu: null,
  number: 2,
  isProposal: false,
  massFrom: 'photometry',
  semiMajorAxisFrom: 'given',
  reason: 'three epochs move with the star',
  file: null,
  by: 'R. Castellan',
  at: '2026-03-05T10:00:00.000Z',
};

describe('the history', () => {
  it('names who, when and why, the newest first', () => {
    const first = { ...verdict, number: 1, status: 'background' as const, isProposal: true };
    const markup = renderToStaticMarkup(
      createElement(VerdictHistory, { history: [first, verdict] }),
    );
    expect(markup.indexOf('companion')).toBeLessThan(markup.indexOf('proposed: '));
    expect(markup).toContain('R. Castellan, 5 Mar 2026');
    expect(markup).toContain('three epochs move with the star');
  });

  it('names the day of the time zone that the collaboration chose', () => {
    const late = { ...verdict, at: '2026-03-05T22:30:00Z' };
    const dayIn = (zone: string) =>
      renderToStaticMarkup(
        createElement(TimeZoneProvider, {
          zone,
          // biome-ignore lint/correctness/noChildrenProp: it is required, and there is no JSX here
          children: createElement(VerdictHistory, { history: [late] }),
        }),
      );
    expect(dayIn('America/Lima')).toContain('R. Castellan, 5 Mar 2026');
    expect(dayIn('Asia/Tokyo')).toContain('R. Castellan, 6 Mar 2026');
  });

  it('takes the values of the candidate from the newest verdict that is no proposal', () => {
    const older = { ...verdict, number: 1, massFrom: 'file' };
    const proposal = { ...verdict, number: 3, isProposal: true };
    expect(standingVerdict([older, verdict, proposal])).toBe(verdict);
    expect(standingVerdict([proposal])).toBeUndefined();
  });

  it('says how mass and axis came about', () => {
    const markup = renderToStaticMarkup(createElement(VerdictHistory, { history: [verdict] }));
    expect(markup).toMatch(
      /Jupiter masses(<[^>]+>)+, from photometry; 57\.7\u2009AU, given by hand/,
    );
  });
});

describe('estimates in words', () => {
  const mass: MassEstimate = {
    observedOn: '2018-01-01',
    band: 'H',
    absoluteMag: 13.5,
    errorMag: 0.01,
    ageMyr: 10,
    cooling: 'with a bump',
    solutionsMjup: [9.1, 11.8, 15.3],
    interval: { median: 11.9, lower: 9.2, upper: 15.1 },
    outside: null,
    touchesEdge: false,
  };

  it('list every mass where brightness does not rise with mass, with the error that counted', () => {
    const words = massSentence(mass);
    expect(words).toContain('13.50 ± 0.05 in H on 2018-01-01, age 10 Myr, with a bump');
    expect(words).toContain('9.10, 11.8, 15.3 Jupiter masses all have this magnitude');
  });

  it('say where no mass is read, and what an axis leaves out', () => {
    const outside = { ...mass, solutionsMjup: [], interval: null, outside: 'brighter' as const };
    expect(massSentence(outside)).toContain('brighter than every mass of the relation');
    const axis = { median: 57.7, lower: 50.6, upper: 92, observedOn: '2018-01-01' };
    expect(axisSentence({ ...axis, projectedSeparationAu: 50 })).toContain(
      'Projected separation 50.0 AU on 2018-01-01',
    );
  });
});
