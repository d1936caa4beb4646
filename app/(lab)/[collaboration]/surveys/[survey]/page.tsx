import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { NotesOf } from '@/app/(lab)/[collaboration]/notes-of';
import { currentActor } from '@/app/session';
import { SurveyScreen } from '@/components/surveys/survey-screen';
import { NotFound } from '@/lib/errors';
import { pack } from '@/lib/schemas/packed';
import { nameCooling } from '@/lib/services/cooling-tables';
import { listShares } from '@/lib/services/sharing/shares';
import { currentYardstick } from '@/lib/services/survey-depth';
import { getSurvey } from '@/lib/services/surveys';
import { listCompanions, listTargets } from '@/lib/services/targets';
import { listUploads } from '@/lib/services/uploads';

export const metadata: Metadata = { title: 'Survey' };

const FIRST_PAGE = { limit: 500, offset: 0 };

export default async function SurveyPage({
  params,
}: {
  params: Promise<{ collaboration: string; survey: string }>;
}) {
  const { collaboration, survey: slug } = await params;
  const actor = await currentActor(collaboration);
  try {
    const [survey, targets, companions, uploads, yardstick, shares] = await Promise.all([
      getSurvey(actor, slug),
      listTargets(actor, slug, FIRST_PAGE),
      listCompanions(actor, slug),
      listUploads(actor, slug, { limit: 50, offset: 0 }),
      currentYardstick(actor.collaborationId),
      listShares(actor),
    ]);
    return (
      <>
        <SurveyScreen
          collaboration={actor.collaboration}
          survey={survey}
          targets={pack(targets)}
          companions={companions}
          uploads={uploads}
          shares={shares}
          coolingName={await nameCooling(actor, survey)}
          population={yardstick.isFlat ? null : yardstick.population}
        />
        <NotesOf actor={actor} on={{ kind: 'survey', key: slug }} />
      </>
    );
  } catch (error) {
    if (error instanceof NotFound) notFound();
    throw error;
  }
}
