import path from 'node:path';
import type { Page } from '@playwright/test';
import { dropFile, openLaboratory } from '../browser';
import {
  curvesFile,
  type InventedSurvey,
  pairsByPosition,
  targetsFile,
  threeSurveys,
} from '../invented-sky';
import type { Bench, Measured, Row } from '../row';
import { Stages } from '../stages';

const LAB = '/breakwater';
const POINTS = 24;
const MOST_SECONDS = 600;
const WEB_MB = 600;
const WORKER_MB = 800;
const scale = () => Number(process.env.HARDEN_SCALE ?? 1);

async function addSurvey(page: Page, survey: InventedSurvey): Promise<void> {
  await page.goto(`${LAB}/surveys/new`);
  await page.getByLabel('Name', { exact: true }).fill(survey.name);
  await page.getByLabel('Band of the contrast curves').fill('H');
  await page.getByLabel('First year').fill('2019');
  await page.getByRole('button', { name: 'Add the survey and import files' }).click();
  await page.getByRole('heading', { name: `Import into ${survey.name}` }).waitFor();
}

async function bringIn(page: Page, kind: string, name: string, text: string): Promise<void> {
  await page.getByRole('radio', { name: kind }).check();
  await dropFile(page, name, text);
  const article = page.getByRole('article', { name });
  await article.getByText('ready to store').waitFor();
  await page.getByRole('button', { name: `Store ${name}` }).click();
  await article.getByText('stored', { exact: true }).waitFor();
}

/** Until the survey's page says that every target has its map. */
async function waitForMaps(page: Page, { slug, entries }: InventedSurvey): Promise<void> {
  await page.goto(`${LAB}/surveys/${slug}`);
  const { length } = entries;
  await page
    .getByText(new RegExp(`^${length}\\s?of ${length}$`))
    .first()
    .waitFor();
}

const REASON = 'Same place, motion and distance';

/** Takes the plain pairs for one star together, and the others one by one. */
async function confirmPairs(page: Page): Promise<number> {
  await page.goto(`${LAB}/stars/overlaps`);
  await page.getByRole('button', { name: /^Decide \d+ plain pairs$/ }).click();
  const plain = page.getByRole('dialog');
  const boxes = plain.getByRole('checkbox');
  await boxes.first().waitFor();
  let confirmed = await boxes.filter({ visible: true }).count();
  await plain.getByLabel('Reason').fill(REASON);
  await plain.getByRole('button', { name: `Join ${confirmed} pairs` }).click();
  await plain.waitFor({ state: 'hidden' });
  await page.getByText(`${confirmed} pairs joined`).first().waitFor();
  const cards = page.getByRole('listitem').filter({ hasText: 'SKUA' });
  const waiting = cards.getByRole('button', { name: 'One star', exact: true });
  for (let left = await waiting.count(); left > 0; left--) {
    await waiting.first().click();
    const dialog = page.getByRole('dialog');
    await dialog.getByLabel('Reason').fill(REASON);
    await dialog.getByRole('button', { name: 'One star' }).click();
    await dialog.waitFor({ state: 'hidden' });
    await waiting.nth(left - 1).waitFor({ state: 'hidden' });
    confirmed++;
  }
  return confirmed;
}

/** @returns how many stars the page counts in so many entries */
async function combine(page: Page, surveys: InventedSurvey[], entries: number): Promise<number> {
  const answer = await page.request.get(`/api/v1/collaborations${LAB}/surveys`);
  const all: string[] = (await answer.json()).surveys.map(({ name }: { name: string }) => name);
  await page.goto(`${LAB}/surveys/combine`);
  await page.getByRole('heading', { name: 'Combine surveys' }).waitFor();
  const boxes = page.getByRole('group', { name: /Surveys, in order/ });
  for (const other of all.filter((name) => !surveys.some((own) => own.name === name))) {
    await boxes.getByRole('checkbox', { name: other }).uncheck();
  }
  await page.getByLabel('Name', { exact: true }).fill('Invented sky');
  const figures = page.locator('dl dd');
  await figures.filter({ hasText: new RegExp(`^${entries}$`) }).waitFor();
  const stars = Number(await figures.first().textContent());
  await page.getByRole('button', { name: 'Save as a new combination' }).click();
  await page.getByRole('link', { name: /^New analysis with/ }).click();
  return stars;
}

async function analyse(page: Page): Promise<string> {
  await page.getByRole('heading', { level: 1, name: 'New analysis' }).waitFor();
  await page.getByLabel('Name', { exact: true }).fill('Three surveys');
  await page.getByRole('button', { name: 'Create and run' }).click();
  await page.getByRole('heading', { level: 1, name: 'Three surveys' }).waitFor();
  const limit = page.locator('#statement .statement-number').filter({ hasText: /^<\d/ });
  await limit.waitFor();
  return (await limit.textContent()) ?? '';
}

async function measure({ product, say, folder }: Bench): Promise<Measured> {
  const surveys = threeSurveys(scale());
  const files = surveys.map((survey) => ({
    targets: targetsFile(survey),
    curves: curvesFile(survey, POINTS),
  }));
  const stars = new Set(surveys.flatMap(({ entries }) => entries.map(({ star }) => star))).size;
  const entries = surveys.reduce((sum, survey) => sum + survey.entries.length, 0);
  const running = await product();
  const stages = new Stages(running, say);
  const { browser, page, faults } = await openLaboratory(running, 'owner');
  try {
    for (const [i, survey] of surveys.entries()) {
      const { slug } = survey;
      await stages.time(`import ${survey.name}`, async () => {
        await addSurvey(page, survey);
        await bringIn(page, 'targets', `${slug}-targets.csv`, files[i].targets);
        await bringIn(page, 'contrast curves', `${slug}-curves.csv`, files[i].curves);
      });
      await stages.time(`maps ${survey.name}`, () => waitForMaps(page, survey));
    }
    const confirmed = await stages.time('match', () => confirmPairs(page));
    const combined = await stages.time('combine', () => combine(page, surveys, entries));
    const limit = await stages.time('analyse', () => analyse(page));
    const plate = (await page.locator('#statement').textContent()) ?? '';
    const counted = Number(/(\d[\d\s,\u202f\u2009]*) stars/.exec(plate)?.[1].replace(/\D/g, ''));
    const total = stages.sum('import', 'maps', 'match', 'combine', 'analyse');
    const { webMb, workerMb } = stages.peak;
    return {
      isMet:
        counted === stars &&
        combined === stars &&
        confirmed === pairsByPosition(surveys) &&
        faults.length === 0 &&
        total <= MOST_SECONDS &&
        webMb <= WEB_MB &&
        workerMb <= WORKER_MB,
      figure:
        `${entries} targets, ${counted} of ${stars} stars in the limit ${limit}: imported in ` +
        `${stages.sum('import')} s, mapped ${stages.sum('maps')} s, ${confirmed} overlaps confirmed ` +
        `${stages.sum('match')} s, combined ${stages.sum('combine')} s, analysed ` +
        `${stages.sum('analyse')} s; web at most ${webMb} MB, worker ${workerMb} MB`,
      details: { entries, stars, combined, counted, confirmed, limit, ...stages.details },
      notes: faults,
    };
  } catch (error) {
    await page.screenshot({ path: path.join(folder, 'stopped.png'), fullPage: true });
    throw error;
  } finally {
    await browser.close();
  }
}

export const row: Row = {
  name: 'journey',
  what: 'three surveys of 1200 targets and 1000 stars through the screens, from files to a limit',
  goal: `every star once in the limit, within ${MOST_SECONDS} s; web under ${WEB_MB} MB, worker under ${WORKER_MB} MB`,
  measure,
};
