import { type Actor, actorIn, EVERY_SCOPE } from '@/lib/access/actor';
import { hashPassword } from '@/lib/access/passwords';
import { createRandom, deriveSeed } from '@/lib/numerics/random';
import { mapSettingsSchema } from '@/lib/schemas/sensitivity';
import { acceptShare, offerSurvey } from '@/lib/services/sharing/offers';
import { listShares } from '@/lib/services/sharing/shares';
import { createSurvey } from '@/lib/services/surveys';
import { CollaborationRow, JobRow, MemberRow, PersonRow } from '@/models';
import { curvesFile, targetsFile } from './files';
import { makePassword } from './people';
import { DEMO_SEED, type DemoStar, type DemoSurvey, drawStar } from './sky';
import { bringIn } from './store';

/** A second, small collaboration, so that sharing can be seen from both sides. */
export const NEIGHBOURS = { slug: 'lantern-array', email: 'skov@lantern.example' };
const PERSON = 'Edda Skov';

const shared: DemoSurvey = {
  slug: 'lantern',
  name: 'LANTERN',
  band: 'H',
  from: 2022,
  to: 2024,
  lead: 'skov',
  description: 'A pilot of a few nearby stars.',
  floorMag: 13.0,
  innerArcsec: 0.15,
  outerArcsec: 3.0,
};
const offered: DemoSurvey = {
  ...shared,
  slug: 'skerry',
  name: 'SKERRY',
  from: 2024,
  to: 2025,
  description: 'Stars of the southern winter.',
};

const ARCSEC_PER_DEG = 3600;
const CONFLICT = { ageMyr: 45, ageErrorMyr: 5 };

function ownStars(survey: DemoSurvey, count: number): DemoStar[] {
  return Array.from({ length: count }, (_, i) => ({
    ...drawStar(createRandom(deriveSeed(DEMO_SEED, `${survey.slug} ${i}`)), [survey.slug]),
    name: `${survey.name} ${i + 1}`,
  }));
}

/** Of two stars of the first collaboration: one that is given another age, one under another name. */
function commonStars(sky: readonly DemoStar[]): { aged: DemoStar; renamed: DemoStar } {
  const ofOnly = (slug: string) => sky.filter(({ surveys }) => surveys.join() === slug);
  const young = ofOnly('halyard').find(({ ageMyr, group }) => group !== null && ageMyr === 24);
  const [, , near] = ofOnly('petrel');
  if (!young) throw new Error('the sky of the demonstration has no such young star');
  return {
    aged: { ...young, ...CONFLICT, group: null },
    renamed: {
      ...near,
      name: `${shared.name} 7`,
      gaiaDr3Id: '',
      decDeg: Number((near.decDeg + 1.2 / ARCSEC_PER_DEG).toFixed(6)),
    },
  };
}

async function makeOwner(): Promise<{ actor: Actor; password: string }> {
  const password = makePassword();
  const { slug, email } = NEIGHBOURS;
  const [collaboration, person] = await Promise.all([
    CollaborationRow.create({ slug, name: 'Lantern Array' }),
    PersonRow.create({ email, name: PERSON, passwordHash: await hashPassword(password) }),
  ]);
  await MemberRow.create({
    collaborationId: collaboration.id,
    personId: person.id,
    roles: ['owner', 'collaborator'],
  });
  return { actor: await memberOf(slug, email), password };
}

/** A person of the demonstration, as the services see them. */
export async function memberOf(slug: string, email: string): Promise<Actor> {
  const { id, name } = await PersonRow.findOne({ where: { email }, rejectOnEmpty: true });
  const scopes = [...EVERY_SCOPE];
  return actorIn({ personId: id, personName: name, email, via: 'session', scopes }, slug);
}

async function importFew(
  actor: Actor,
  survey: DemoSurvey,
  stars: DemoStar[],
  reduced: DemoStar[],
  finish: (jobId: string) => Promise<void>,
): Promise<void> {
  const { slug, name, band, description, from: observedFrom, to: observedTo } = survey;
  const mapSettings = mapSettingsSchema.parse({});
  const about = { slug, name, band, description, observedFrom, observedTo, mapSettings };
  const made = await createSurvey(actor, about);
  await bringIn(actor, 'targets', `${slug}-targets.csv`, targetsFile(survey, stars), slug);
  await bringIn(actor, 'contrast-curves', `${slug}-curves.csv`, curvesFile(survey, reduced), slug);
  await finish((await JobRow.findOne({ where: { surveyId: made.id }, rejectOnEmpty: true })).id);
}

/**
 * Makes the second collaboration with one survey that the first has accepted and one that waits for
 * its answer. The first brings an age that disagrees, and a star that may be one under another name;
 * that star has no curve yet, so that no analysis has to wait for the decision.
 *
 * @returns how its owner signs in
 */
export async function addNeighbours(
  host: Actor,
  sky: readonly DemoStar[],
  finish: (jobId: string) => Promise<void>,
): Promise<{ role: string; email: string; password: string }> {
  const { actor, password } = await makeOwner();
  const { aged, renamed } = commonStars(sky);
  const reduced = [...ownStars(shared, 4), aged];
  await importFew(actor, shared, [...reduced, renamed], reduced, finish);
  const further = ownStars(offered, 4);
  await importFew(actor, offered, further, further, finish);
  const { code } = await listShares(host);
  const terms = { code, expiresInDays: 365 };
  const { id } = await offerSurvey(actor, shared.slug, {
    ...terms,
    scope: 'whole',
    note: 'For the joint paper; the curve of LANTERN 7 follows.',
    attribution: 'LANTERN pilot, Skov and the Lantern Array team',
  });
  await acceptShare(host, id);
  await offerSurvey(actor, offered.slug, {
    ...terms,
    scope: 'maps',
    note: 'Our reduction is not published yet, so the maps only.',
    attribution: 'SKERRY maps, courtesy of the Lantern Array team',
  });
  return { role: 'owner of Lantern Array', email: NEIGHBOURS.email, password };
}
