import { parse } from 'csv-parse/sync';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { GET as getMapExport } from '@/app/api/v1/collaborations/[collaboration]/maps/[map]/exports/[file]/route';
import { GET as getExport } from '@/app/api/v1/collaborations/[collaboration]/runs/[run]/exports/[file]/route';
import { GET as listRunExports } from '@/app/api/v1/collaborations/[collaboration]/runs/[run]/exports/route';
import { GET as getStatement } from '@/app/api/v1/collaborations/[collaboration]/runs/[run]/statement/route';
import { GET as getSurveyExport } from '@/app/api/v1/collaborations/[collaboration]/surveys/[survey]/exports/[file]/route';
import { readUploadedFile } from '@/lib/formats';
import { formatRate } from '@/lib/quantities/display';
import type { ListedExport } from '@/lib/schemas/exports';
import type { RunInputs } from '@/lib/schemas/runs';
import { limitStatementSchema } from '@/lib/schemas/statement';
import { encodeMap } from '@/lib/sensitivity';
import { getRunMaps } from '@/lib/services/runs';
import { TargetRow } from '@/models';
import { withDatabase } from '../support/database';
import { buildFinishedLab, type FinishedLab } from '../support/finished-run';
import { bearer, call, createCollaborationWith, tokenOf } from '../support/people';
import { killWorkers, startWorker } from '../support/worker';

const { query } = withDatabase();
let lab: FinishedLab;
let headers: Record<string, string>;

beforeAll(async () => {
  await startWorker({ threads: 1 });
  lab = await buildFinishedLab();
  headers = bearer(await tokenOf(lab.people.student, lab.collaboration));
});
afterAll(killWorkers);

async function fetchFile(file: string, search = '') {
  const params = { collaboration: lab.collaboration.slug, run: lab.run.id, file };
  const response = await call(getExport, { headers, params, path: `/${search}` });
  return { response, text: await response.text() };
}

async function fetchBytes(file: string) {
  const params = { collaboration: lab.collaboration.slug, run: lab.run.id, file };
  const response = await call(getExport, { headers, params });
  return { response, bytes: new Uint8Array(await response.arrayBuffer()) };
}

type Row = Record<string, string>;

/** What every file of a run has to say beside its numbers. */
function expectConditions(text: string): void {
  expect(text).toContain(lab.run.resultDigest as string);
  expect(text.toLowerCase()).toContain('draft');
  expect(text).toMatch(/uniform in host fraction f/);
  expect(text).toMatch(/0\.95|95/);
  expect(text).toMatch(/confirmed companions inside the ranges|1 inside the ranges/);
}

describe('limits.csv', () => {
  it('has one header, a row per quantity, rule and level, and every condition', async () => {
    const { response, text } = await fetchFile('limits.csv');
    expect(response.headers.get('content-type')).toBe('text/csv; charset=utf-8');
    expect(response.headers.get('content-disposition')).toBe(
      `attachment; filename="${lab.key}-run-1-limits.csv"`,
    );
    expectConditions(text);
    const rows = parse(text, { columns: true }) as Record<string, string>[];
    expect(Object.keys(rows[0]).slice(0, 21)).toEqual(
      (
        'analysis,subset,likelihood,population,rate_prior,mass_min,mass_max,semi_major_axis_min,' +
        'semi_major_axis_max,quantity,interval,credible_level,lower,estimate,upper,mcse,' +
        'n_targets,n_companions,effective_targets,run,engine_version'
      ).split(','),
    );
    const limits = rows.filter(({ interval }) => interval === 'upper_limit');
    expect(limits).toHaveLength(20);
    const own = limits.find(
      (row) =>
        row.quantity === 'host_fraction' &&
        row.credible_level === '0.95' &&
        row.n_companions === '1',
    );
    const { answer, zero } = lab.run.result as NonNullable<typeof lab.run.result>;
    expect(Number(own?.upper)).toBe(answer.limit);
    expect(Number(own?.estimate)).toBe(answer.median);
    expect(own?.lower).toBe('');
    const aside = limits.find(
      (row) =>
        row.quantity === 'host_fraction' &&
        row.credible_level === '0.95' &&
        row.counting_rule === 'all detections set aside',
    );
    expect(Number(aside?.upper)).toBe(zero.limit);
    expect(rows.filter(({ interval }) => interval === 'central')).toHaveLength(4);
    expect(new Set(rows.map(({ state }) => state))).toEqual(new Set(['draft']));
  });
});

describe('posterior', () => {
  it('holds the curve to the last digit, and integrates to one', async () => {
    const { text } = await fetchFile('posterior.csv');
    const rows = parse(text, { columns: true }) as Record<string, string>[];
    expect(Object.keys(rows[0])).toEqual(['quantity', 'value', 'density', 'cumulative']);
    const { value, density } = (lab.run.result as NonNullable<typeof lab.run.result>).answer.curve;
    expect(rows.map((row) => Number(row.value))).toEqual(value);
    expect(rows.map((row) => Number(row.density))).toEqual(density);
    expect(Number(rows.at(-1)?.cumulative)).toBeGreaterThan(0.998);
    for (const file of ['posterior.ecsv', 'posterior.vot', 'posterior.json', 'posterior.txt']) {
      expectConditions((await fetchFile(file)).text);
    }
  });
});

describe('targets and companions', () => {
  it('say of each whether the run used it, and why', async () => {
    const targets = parse((await fetchFile('targets.csv')).text, { columns: true }) as Row[];
    expect(targets.map(({ name, used }) => [name, used])).toEqual(
      [1, 2, 3, 4, 5, 6, 7, 8].map((i) => [`Star ${i}`, 'True']),
    );
    const companions = parse((await fetchFile('companions.csv')).text, { columns: true }) as Row[];
    expect(companions.map(({ target, used }) => [target, used])).toEqual([['Star 3', 'True']]);
  });

  it('of a survey can be imported again', async () => {
    const response = await call(getSurveyExport, {
      headers,
      params: {
        collaboration: lab.collaboration.slug,
        survey: lab.survey.slug,
        file: 'targets.ecsv',
      },
    });
    const bytes = new Uint8Array(await response.arrayBuffer());
    const read = await readUploadedFile(bytes, { fileName: 'targets.ecsv', kind: 'targets' });
    if (!read.ok || read.kind !== 'targets') throw new Error(JSON.stringify(read));
    const rows = await TargetRow.findAll({
      where: { surveyId: lab.survey.id },
      order: [['name', 'ASC']],
    });
    expect(read.records.map(({ name, distancePc, ageMyr }) => [name, distancePc, ageMyr])).toEqual(
      rows.map(({ name, distancePc, ageMyr }) => [name, distancePc, ageMyr]),
    );
  });
});

describe('maps', () => {
  it('are the numbers that the run integrated, star by star, in every container', async () => {
    const { massMjup, semiMajorAxisAu } = (lab.run.inputs as RunInputs).grid;
    const maps = await getRunMaps(lab.owner, lab.run.id);
    for (const ending of ['npz', 'h5', 'fits']) {
      const { response, bytes } = await fetchBytes(`maps.${ending}`);
      expect(Number(response.headers.get('content-length'))).toBe(bytes.length);
      const context = { fileName: `maps.${ending}`, kind: 'completeness-maps' } as const;
      const read = await readUploadedFile(bytes, context);
      if (!read.ok || read.kind !== 'completeness-maps') throw new Error(JSON.stringify(read));
      expect(read.records.map(({ target }) => target)).toEqual(
        lab.run.inputs?.stars.map(({ name }) => name),
      );
      expect(read.records[0].massMjup).toEqual(massMjup);
      expect(read.records[0].semiMajorAxisAu).toEqual(semiMajorAxisAu);
      const encoded = read.records.flatMap(({ completeness }) => [
        ...encodeMap(Float64Array.from(completeness)),
      ]);
      expect(encoded).toEqual([...new Uint16Array(Uint8Array.from(maps.bytes).buffer)]);
    }
  });

  it('have their length told before they are made', async () => {
    const params = { collaboration: lab.collaboration.slug, run: lab.run.id };
    const list = await (await call(listRunExports, { headers, params })).json();
    expect(list.state).toBe('draft, run 1');
    for (const { name, byteLength } of list.files as ListedExport[]) {
      if (byteLength === null) continue;
      expect((await fetchBytes(name)).bytes.length, name).toBe(byteLength);
    }
    expect(list.missing).toHaveLength(1);
  });

  it('of one star go out alone', async () => {
    const star = lab.run.inputs?.stars[0] as { mapId: string; name: string };
    const response = await call(getMapExport, {
      headers,
      params: { collaboration: lab.collaboration.slug, map: star.mapId, file: 'maps.json' },
    });
    const map = await response.json();
    expect(map.target).toBe(star.name);
    expect(map.completeness).toHaveLength(map.mass.values.length);
  });
});

describe('methods', () => {
  it('cite in each form what the BibTeX file holds, with the numbers of the run', async () => {
    const bib = (await fetchFile('references.bib')).text;
    const keys = [...bib.matchAll(/^@article\{(\w+),/gm)].map(([, key]) => key);
    expect(keys).toContain('Lafreniere2007');
    const tex = (await fetchFile('methods.tex')).text;
    const inText = [...tex.matchAll(/\\citep\{([^}]+)\}/g)].flatMap(([, list]) => list.split(','));
    expect([...new Set(inText)].sort()).toEqual(keys);
    const markdown = (await fetchFile('methods.md')).text;
    const inMarkdown = [...markdown.matchAll(/(?<!\\)@(\w+)/g)].map(([, key]) => key);
    expect([...new Set(inMarkdown)].sort()).toEqual(keys);
    const { text } = await fetchFile('methods.txt');
    expectConditions(text);
    const { answer } = lab.run.result as NonNullable<typeof lab.run.result>;
    expect(text).toContain(formatRate(answer.limit, 'host_fraction'));
    expect(text).toContain('Star 3');
  });
});

describe('run.json', () => {
  it('holds everything', async () => {
    const { text } = await fetchFile('run.json');
    expectConditions(text);
    const all = JSON.parse(text);
    expect(all.result).toEqual(JSON.parse(JSON.stringify(lab.run.result)));
    expect(all.inputs).toEqual(JSON.parse(JSON.stringify(lab.run.inputs)));
    expect(all.state).toBe('draft');
  });
});

describe('limits.tex', () => {
  it('is a deluxetable, and a plain tabular by choice', async () => {
    const { text } = await fetchFile('limits.tex');
    expect(text).toContain('\\begin{deluxetable}');
    expect(text).toMatch(/95\\,\\% & \$<[\d.]+\$ & \$<[\d.]+\$/);
    expectConditions(text);
    expect(text).toContain('Highest density');
    expect(text).toMatch(
      /Equal-tailed & confirmed companions [^&]*& 68\\,\\% & [\d.]+ & [\d.]+ & [\d.]+/,
    );
    const levels = await fetchFile('levels.tex');
    expect(levels.text).toContain('\\begin{deluxetable}');
    expect(levels.text).not.toContain('Equal-tailed');
    const plain = await fetchFile('limits.tex', '?style=tabular');
    expect(plain.text).toContain('\\begin{tabular}');
    expect((await fetchFile('limits.tex', '?style=word')).response.status).toBe(400);
  });
});

describe('posterior.svg', () => {
  it('is a figure with its text as text, and says what it rests on', async () => {
    const { response, text } = await fetchFile('posterior.svg', '?width=180');
    expect(response.headers.get('content-type')).toContain('image/svg+xml');
    expect(response.headers.get('content-security-policy')).toContain('sandbox');
    expect(text).toContain('<title>');
    expect(text).toContain('draft, run 1');
    const words = text.replace(/<[^>]*>/g, ' ').replace(/\s+/g, ' ');
    expect(words).toContain((lab.run.resultDigest as string).slice(0, 12));
    expect(text).not.toContain('var(');
  });

  it('comes as PDF too, with its fonts inside', async () => {
    const { response, text } = await fetchFile('posterior.pdf', '?width=88');
    expect(response.headers.get('content-type')).toBe('application/pdf');
    expect(text.startsWith('%PDF-1.')).toBe(true);
    expect(text).toMatch(/\/FontName \/[A-Z]{6}\+SourceSans3/);
  });
});

describe('exports', () => {
  it('are noted in the log', async () => {
    const rows = await query<{ summary: string }>(
      `select distinct summary from audit_entry where action = 'export' order by 1`,
    );
    expect(rows.map(({ summary }) => summary)).toContain(`exported ${lab.key}-run-1-posterior.svg`);
  });

  it('are not there for a stranger, nor under another name', async () => {
    const other = await createCollaborationWith(['owner']);
    const response = await call(getExport, {
      headers: bearer(await tokenOf(other.people.owner, other.collaboration)),
      params: { collaboration: other.collaboration.slug, run: lab.run.id, file: 'limits.csv' },
    });
    expect(response.status).toBe(404);
    expect((await fetchFile('constructor')).response.status).toBe(404);
  });
});

describe('GET …/runs/{run}/statement', () => {
  const state = async (search = '', accept?: string) => {
    const params = { collaboration: lab.collaboration.slug, run: lab.run.id };
    const asked = accept === undefined ? headers : { ...headers, accept };
    const response = await call(getStatement, { headers: asked, params, path: `/${search}` });
    return { response, text: await response.text() };
  };

  it('is the recorded limit with its conditions, as JSON that its schema reads', async () => {
    const { response, text } = await state();
    expect(response.headers.get('content-type')).toBe('application/json');
    const statement = limitStatementSchema.parse(JSON.parse(text));
    const { answer, statement: own } = lab.run.result as NonNullable<typeof lab.run.result>;
    expect(statement.upperLimit).toBe(answer.limit);
    expect(statement.sentence).toBe(own.sentence);
    expect(statement.run?.resultDigest).toBe(lab.run.resultDigest);
    for (const condition of own.conditions) {
      const words = statement.conditions.map(({ label, text }) => `${label}: ${text}`);
      expect(words).toContain(condition);
    }
  });

  it('is text or LaTeX by Accept or by ?as=, at a level that was recorded', async () => {
    const text = await state('?level=0.68&detections=none', 'text/plain');
    expect(text.response.headers.get('content-type')).toBe('text/plain; charset=utf-8');
    expect(text.text).toMatch(/^<.* \(68.%\)\.\n/);
    expect(text.text).toContain('Detections: none');
    const latex = await state('?as=latex', 'text/plain');
    expect(latex.response.headers.get('content-type')).toBe('application/x-latex; charset=utf-8');
    expect(latex.text).toContain('$M_{\\mathrm{J}}$');
  });

  it('refuses a level that the run did not record and names those it did', async () => {
    const { response, text } = await state('?level=0.77');
    expect(response.status).toBe(422);
    expect(text).toContain('0.68');
  });
});
