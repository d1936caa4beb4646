import { createElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { CandidateChoice } from '@/components/analyses/candidate-choice';
import { CombinationChoice } from '@/components/analyses/combination-choice';
import { incomplete, tallyOpen, tallyWords } from '@/components/analyses/open-candidates';
import { NO_TABLE, priorOfRun } from '@/components/analyses/prior-of-run';
import { RateChoice } from '@/components/analyses/rate-choice';
import { analysisRecipeSchema } from '@/lib/schemas/analyses';
import type { RunView } from '@/lib/schemas/runs';
import type { CompanionView } from '@/lib/schemas/surveys';
import { definition } from '../runs/sample';

const nothing = () => {};

function companion(given: Partial<CompanionView>): CompanionView {
  return {
    ...{ id: 'c', target: 'Star 1', targetId: 't', name: 'cc1', status: 'candidate' },
    ...{ massMjup: 9, massErrorLowerMjup: null, massErrorUpperMjup: null },
    ...{ semiMajorAxisAu: 50, semiMajorAxisErrorLowerAu: null, semiMajorAxisErrorUpperAu: null },
    ...{ probability: 0.3, reference: null },
    ...given,
  };
}

const companions = [
  companion({}),
  companion({ target: 'Star 2', probability: null }),
  companion({ target: 'Star 3', semiMajorAxisAu: 900, probability: null }),
  companion({ target: 'Star 4', massMjup: null }),
  companion({ target: 'Star 5', status: 'ambiguous' }),
  companion({ target: 'Star 5', status: 'confirmed' }),
  companion({ target: 'Star 6', status: 'background' }),
];

describe('open candidates of the chosen surveys', () => {
  const tally = tallyOpen(companions, definition);

  it('are counted once, by where they lie; a settled one is none', () => {
    expect(tallyWords(tally)).toBe(
      '2 candidates without an answer in the ranges: Star 1 cc1 (0.3), Star 2 cc1; 1 outside; 1 of unknown place.',
    );
  });

  it('name those for which a run would be refused', () => {
    expect(incomplete(tally)).toEqual(['Star 2 cc1', 'Star 4 cc1']);
  });

  it('stand beside the choice, with the refusal where they would count', () => {
    const draw = (chosen: { treatment: 'fixed' } | undefined) =>
      renderToStaticMarkup(
        createElement(CandidateChoice, {
          ...{ chosen, likelihood: 'host-fraction', tally },
          onChange: nothing,
        }),
      );
    expect(draw({ treatment: 'fixed' })).toContain('A run would be refused.');
    expect(draw(undefined)).not.toContain('A run would be refused.');
    expect(draw(undefined)).toContain('2 candidates without an answer in the ranges');
  });

  it('ask for the rate that their probabilities were quoted for', () => {
    const markup = renderToStaticMarkup(
      createElement(CandidateChoice, {
        ...{ likelihood: 'mean-number', tally: undefined, onChange: nothing },
        chosen: { treatment: 'rate-dependent', referenceRate: 0.2 },
      }),
    );
    expect(markup).toContain('Rate they were quoted for');
    expect(markup).toContain('value="0.2"');
  });
});

describe('the rule for a star in several surveys', () => {
  it('warns of independent epochs alone', () => {
    const draw = (chosen: 'independent' | 'deepest') =>
      renderToStaticMarkup(createElement(CombinationChoice, { chosen, onChange: nothing }));
    expect(draw('independent')).toContain('Optimistic for repeated observations.');
    expect(draw('deepest')).not.toContain('Optimistic');
  });
});

describe('likelihood and prior', () => {
  const draw = (likelihood: 'mean-number' | 'host-fraction', prior = NO_TABLE) =>
    renderToStaticMarkup(
      createElement(RateChoice, {
        ...{ likelihood, prior, credibleLevel: 0.95 },
        ...{ collaboration: 'c', surveyIds: [], onChange: nothing },
      }),
    );

  it('ask for a background beside the mean number alone', () => {
    expect(draw('mean-number')).toContain('False detections expected');
    expect(draw('host-fraction')).not.toContain('False detections expected');
  });

  it('offer the posterior of another run, and the recipe waits until one is chosen', () => {
    expect(draw('host-fraction')).toContain('Run whose posterior is the prior');
    const { error } = analysisRecipeSchema.safeParse({
      surveyIds: ['0198c0de-0000-7000-8000-000000000001'],
      populationId: '0198c0de-0000-7000-8000-000000000002',
      likelihood: 'host-fraction',
      prior: NO_TABLE,
    });
    expect(error?.issues[0].path).toEqual(['prior', 'value']);
  });
});

describe('the posterior of a run as a prior', () => {
  const run = {
    analysis: { id: 'a', key: 'A-31', name: 'Giants' },
    number: 18,
    resultDigest: '0123456789abcdef',
    result: {
      quantity: 'host_fraction',
      answer: { curve: { value: [0, 0.5, 1], density: [2, 1, 0], cumulative: [], prior: [] } },
    },
  } as unknown as RunView;

  it('is its curve with its source', () => {
    expect(priorOfRun(run, 'host-fraction')).toEqual({
      law: 'tabulated',
      value: [0, 0.5, 1],
      density: [2, 1, 0],
      source: 'A-31 run 18, fingerprint 0123456789ab',
    });
  });

  it('is refused in words for another quantity', () => {
    expect(() => priorOfRun(run, 'mean-number')).toThrow(
      /A-31 run 18 answers for the fraction of stars.*asks for planets per star/,
    );
  });
});
