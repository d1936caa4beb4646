import { describe, expect, it } from 'vitest';
import { dataCsv } from '@/components/charts/data-table';
import { writeAnswerJson } from '@/components/studies/answer-files';
import {
  cornerParameters,
  cornerPlanes,
} from '@/components/studies/free-indices/free-index-parameters';
import {
  freeAgainstFixed,
  freeIndicesInWords,
} from '@/components/studies/free-indices/free-indices-words';
import { newestByKind } from '@/components/studies/further-questions';
import type { AskedRun } from '@/components/studies/kind-entry';
import { kindOrder, kindWords, questionAddress } from '@/components/studies/kind-words';
import { kinds, settingsInWords } from '@/components/studies/kinds';
import { stageInWords } from '@/components/studies/question-progress';
import { usualSpan } from '@/components/studies/sweep/sweep-parameters';
import { sweepTables } from '@/components/studies/sweep/sweep-tables';
import { faultsByField, readNumber } from '@/components/studies/use-settings-form';
import { InputError } from '@/lib/errors';
import { parseInput } from '@/lib/schemas/input';
import type { StudySummary, StudyView } from '@/lib/schemas/studies';
import {
  freeIndicesSettingsSchema,
  studySettingsSchema,
  sweepSettingsSchema,
} from '@/lib/schemas/study-settings';
import { definition } from '../runs/sample';
import { buildFreeIndices, buildSweep } from './fixtures';

const asked = {
  definition,
  quantity: 'host_fraction',
  inputs: { grid: { massMjup: [0.5, 50], semiMajorAxisAu: [1, 1000] } },
} as unknown as AskedRun;

function summary(
  number: number,
  kind: 'counts' | 'limit-map',
  status: StudySummary['job']['status'],
) {
  return {
    id: String(number),
    number,
    settings: { kind },
    job: { status },
  } as unknown as StudySummary;
}

describe('kinds of questions', () => {
  it('all have a title, a question and an address, and no screen says "study"', () => {
    expect(kindOrder).toHaveLength(11);
    for (const kind of kindOrder) {
      expect(kindWords[kind].question).toMatch(/\?$/);
      expect(`${kindWords[kind].title} ${kindWords[kind].question}`).not.toMatch(/stud(y|ies)/i);
      const isForecast = kind === 'forecast';
      expect(questionAddress('lab', 'A-1', kind)).toMatch(
        isForecast ? /^\/lab\/forecasts\/new\?analysis=A-1$/ : /^\/lab\/analyses\/A-1\//,
      );
    }
    expect(questionAddress('lab', 'A-1', 'forecast', 'x')).toBe('/lab/forecasts/x');
    expect(questionAddress('lab', 'A-1', 'calibration', 'x')).toBe(
      '/lab/analyses/A-1/calibration?answer=x',
    );
  });

  it('say their settings in words, indices as dN/dM and dN/da', () => {
    const words = (settings: unknown) => settingsInWords(studySettingsSchema.parse(settings));
    expect(words({ kind: 'sweep', over: 'semi-major-axis-max', from: 30, to: 1000 })).toBe(
      'largest semi-major axis 30–1000\u2009AU, 31 values',
    );
    expect(words({ kind: 'sweep', over: 'both-indices', from: -2, to: 1, count: 21 })).toBe(
      'both indices −3 to 0, 21 × 21 values',
    );
    expect(words({ kind: 'limit-map' })).toBe('at each mass and semi-major axis');
    expect(words({ kind: 'counts', rate: 0.07 })).toBe('at a rate of 7 per 100 stars');
    expect(freeIndicesInWords(freeIndicesSettingsSchema.parse({ kind: 'free-indices' }))).toContain(
      'α uniform −3 to 0',
    );
    for (const kind of Object.keys(kinds)) expect(kindOrder).toContain(kind);
  });
});

describe('the list of further questions', () => {
  it('prefers what is on its way, then the newest answer, then a failure', () => {
    const newest = newestByKind([
      summary(1, 'counts', 'done'),
      summary(2, 'counts', 'failed'),
      summary(3, 'limit-map', 'done'),
      summary(4, 'limit-map', 'running'),
    ]);
    expect(newest.get('counts')?.number).toBe(1);
    expect(newest.get('limit-map')?.number).toBe(4);
    expect(newestByKind([summary(5, 'counts', 'cancelled')]).get('counts')?.number).toBe(5);
  });

  it('reads stages as words', () => {
    expect(stageInWords('maps-anew')).toBe('Maps anew');
    expect(stageInWords('')).toBe('Starting');
  });
});

describe('settings forms', () => {
  const faultsOf = (settings: unknown) => {
    try {
      parseInput(sweepSettingsSchema, settings);
    } catch (reason) {
      if (reason instanceof InputError) return reason.faults;
    }
    return [];
  };

  it('put each fault beside its field, and others under the form', () => {
    const fields = ['over', 'from', 'to', 'count'];
    const order = faultsByField(
      faultsOf({ kind: 'sweep', over: 'mass-min', from: 9, to: 2 }),
      fields,
    );
    expect(order.from).toContain('from below to');
    const missing = faultsByField(
      faultsOf({ kind: 'sweep', over: 'mass-min', from: 'abc', to: 2, count: 2 }),
      fields,
    );
    expect(missing.from).toBe('found "abc"; expected a number');
    expect(missing.count).toContain('at least 3');
    const kindOnly = faultsByField(
      [{ code: 'x', item: 'kind', message: 'Run the analysis with one' }],
      fields,
    );
    expect(kindOnly['']).toBe('Run the analysis with one');
  });

  it('read numbers as they are typed', () => {
    expect(readNumber(' 0,5 ')).toBe(0.5);
    expect(readNumber('−1.3')).toBe(-1.3);
    expect(readNumber('')).toBeUndefined();
    expect(readNumber('ten')).toBeUndefined();
  });

  it('propose a span that the server takes: beyond the other end of the range', () => {
    const span = usualSpan('semi-major-axis-max', asked);
    expect(span.from).toBeGreaterThan(definition.semiMajorAxisMinAu);
    expect(span).toEqual({ from: 30, to: 1000 });
    expect(usualSpan('mass-min', asked).to).toBeLessThan(definition.massMaxMjup);
  });
});

describe('free indices', () => {
  it('are quoted in the convention that is named, their planes with them', () => {
    const result = buildFreeIndices();
    const [linear] = cornerParameters({ asked, result }, 'linear');
    const [log] = cornerParameters({ asked, result }, 'log');
    expect(log.median).toBeCloseTo(-0.5);
    expect(linear.median).toBeCloseTo(-1.5);
    expect(linear.fixed).toBeCloseTo(definition.massIndex - 1);
    const [plane, rate] = cornerPlanes({ result }, 'linear');
    expect([plane.x[0], plane.y[0]]).toEqual([-3, -3]);
    expect(rate.y.at(-1)).toBeCloseTo(14);
  });

  it('say what letting them go does to the limit', () => {
    expect(freeAgainstFixed(0.0763, 0.0576)).toContain('raises the limit by 32');
    expect(freeAgainstFixed(0.05, 0.0576)).toContain('lowers the limit by 13');
    expect(freeAgainstFixed(0.0576, 0.0576)).toContain('does not move');
  });
});

describe('files of an answer', () => {
  const study = {
    number: 3,
    run: { analysisKey: 'A-31', number: 18 },
    settings: { kind: 'sweep', over: 'semi-major-axis-max', from: 30, to: 1000, count: 31 },
    headline: null,
    job: { id: 'secret' },
    resultDigest: 'abc',
  } as unknown as StudyView;

  it('hold every number of the drawing to the last bit, under one header', () => {
    const result = buildSweep();
    const tables = sweepTables({ asked, study, settings: study.settings as never, result });
    expect(tables).toHaveLength(1);
    const lines = dataCsv(tables[0]).trimEnd().split('\n');
    expect(lines[0]).toBe(
      'semi_major_axis_max_au,limit,limit_no_detection,detections,exposure_stars,is_set_by_prior',
    );
    expect(lines).toHaveLength(1 + result.value.length);
    expect(Number(lines[1].split(',')[1])).toBe(result.limit[0]);
  });

  it('quote what would break a line, and say draft in the whole answer', () => {
    const table = { name: 'x', columns: ['a'], rows: [['one, "two"'], [null]] };
    expect(dataCsv(table)).toBe('a\n"one, ""two"""\n""\n');
    const json = JSON.parse(writeAnswerJson(study, ['Prior: uniform']));
    expect(json).toMatchObject({ state: 'draft', number: 3, conditions: ['Prior: uniform'] });
    expect(json.job).toBeUndefined();
  });
});
