import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { currentActor } from '@/app/session';
import { ImportScreen } from '@/components/surveys/import-screen';
import { Notice } from '@/components/ui/notice';
import { PageTitle } from '@/components/ui/page-title';
import { NotFound } from '@/lib/errors';
import { nameCooling } from '@/lib/services/cooling-tables';
import { getSurvey } from '@/lib/services/surveys';

export const metadata: Metadata = { title: 'Import' };

export default async function ImportPage({
  params,
}: {
  params: Promise<{ collaboration: string; survey: string }>;
}) {
  const { collaboration, survey: slug } = await params;
  const actor = await currentActor(collaboration);
  const survey = await getSurvey(actor, slug).catch((error: unknown) => {
    if (error instanceof NotFound) notFound();
    throw error;
  });
  const base = `/${actor.collaboration}/surveys`;
  return (
    <>
      <PageTitle
        title={`Import into ${survey.name}`}
        crumbs={[
          { href: base, label: 'Surveys' },
          { href: `${base}/${survey.slug}`, label: survey.name },
          { label: 'import' },
        ]}
        context="Files are read line by line and shown; nothing is stored before you say so"
      />
      <div className="mt-2">
        {survey.can.import ? (
          <ImportScreen
            collaboration={actor.collaboration}
            survey={survey}
            coolingName={await nameCooling(actor, survey)}
          />
        ) : (
          <Notice
            tone="neutral"
            icon="lock"
            title={`The lead of ${survey.name} imports its files.`}
          >
            {survey.lead ? `That is ${survey.lead.name}.` : 'An owner can name a lead.'} You can
            read the survey and run analyses on it.
          </Notice>
        )}
      </div>
    </>
  );
}
