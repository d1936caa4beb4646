import { createElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { ChangeRowsChart } from '@/components/charts/change-rows-chart';
import { limitDifference } from '@/components/studies/limit-difference';
import { changesOffered, keyOf } from '@/components/studies/systematics/changes-offered';
import {
  changeRows,
  sortRows,
  unchangedInWords,
} from '@/components/studies/systematics/systematics-rows';
import { systematicsSettingsSchema } from '@/lib/schemas/study-settings';
import { buildSystematics } from './check-fixtures';

const options = { tables: [], hasSharedStars: false, ruleInRun: undefined, also: [] };
const offered = (given: Parameters<typeof changesOffered>[0]) =>
  changesOffered(given).flatMap(({ changes }) => changes);

describe('changesOffered', () => {
  it('gives changes that the server reads, each with a key of its own and a sentence', () => {
    const tables = [{ id: '00000000-0000-4000-8000-000000000009', name: 'Cold start 2' }];
    const all = offered({ ...options, tables, hasSharedStars: true });
    const changes = all.map(({ change }) => change);
    expect(systematicsSettingsSchema.parse({ kind: 'systematics', changes }).changes).toEqual(
      changes,
    );
    expect(new Set(all.map(({ key }) => key)).size).toBe(all.length);
    expect(all.every(({ sentence }) => sentence.endsWith('.'))).toBe(true);
    expect(all.map(({ name }) => name)).toContain('Cold start 2');
  });

  it('offers rules for shared stars only where there are some, and never the run’s own', () => {
    expect(offered(options).some(({ change }) => change.change === 'combination')).toBe(false);
    const shared = offered({ ...options, hasSharedStars: true, ruleInRun: 'deepest' });
    const rules = shared.flatMap(({ change }) =>
      change.change === 'combination' ? [change.rule] : [],
    );
    expect(rules).toEqual(['same-position', 'independent']);
  });

  it('keeps a law that only a script had asked for', () => {
    const also = [
      { change: 'eccentricity', law: { law: 'fixed', eccentricity: 0.4 } },
      { change: 'eccentricity', law: { law: 'circular' } },
    ] as const;
    const laws = offered({ ...options, also: [...also] }).filter(
      ({ change }) => change.change === 'eccentricity',
    );
    expect(laws.map(({ key }) => key)).toContain(keyOf(also[0]));
    expect(laws.filter(({ key }) => key === keyOf(also[1]))).toHaveLength(1);
  });
});

describe('rows of what moves the limit', () => {
  it('stand with the largest move first, whichever way it goes, and faults apart', () => {
    const { answered, faulty } = sortRows(buildSystematics().rows);
    expect(answered.map(({ label }) => label)).toEqual([
      'cooling table Cold start 2',
      'ages one sigma younger',
      'ages one sigma older',
      'circular orbits',
      'threshold hard for smooth, smooth for hard',
    ]);
    expect(faulty.map(({ label }) => label)).toEqual(['threshold one sigma lower']);
  });

  it('say differences in points, rates per 100 stars, and when nothing is left of them', () => {
    expect(limitDifference(0.0847, 0.0576, 'host_fraction')).toBe('+2.7 points');
    expect(limitDifference(0.0495, 0.0576, 'host_fraction')).toBe('−0.81 points');
    expect(limitDifference(0.0847, 0.0576, 'companions_per_star')).toBe('+2.7 per 100 stars');
    expect(limitDifference(0.0578, 0.0576, 'host_fraction')).toBe('no change at 2 digits');
  });

  it('say how many stars a change cannot touch', () => {
    expect(unchangedInWords(0, 287)).toBeUndefined();
    expect(unchangedInWords(1, 287)).toBe('1 of 287 stars keep its map');
    expect(unchangedInWords(287, 287)).toBe('leaves every map as it is');
  });

  it('are drawn below and above the run’s own limit', () => {
    const result = buildSystematics();
    const rows = changeRows(sortRows(result.rows).answered, result, 287, 'host_fraction');
    const markup = renderToStaticMarkup(
      createElement(ChangeRowsChart, {
        rows,
        baseline: result.baseline,
        quantity: 'host_fraction',
        levelLabel: '95\u2009%',
      }),
    );
    expect(markup).toContain('largest first: cooling table Cold start 2, below 8.5 per cent');
    expect(markup.match(/change-lower/g)).toHaveLength(2);
    expect(markup.match(/change-higher/g)).toHaveLength(3);
    expect(markup).toContain('this run &lt;5.8\u2009%');
  });
});
