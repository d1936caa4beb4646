import type { Metadata } from 'next';
import { currentActor } from '@/app/session';
import { SurveyForm } from '@/components/surveys/survey-form';
import { Notice } from '@/components/ui/notice';
import { PageTitle } from '@/components/ui/page-title';
import { may } from '@/lib/access/permissions';

export const metadata: Metadata = { title: 'Add a survey' };

export default async function NewSurveyPage({
  params,
}: {
  params: Promise<{ collaboration: string }>;
}) {
  const actor = await currentActor((await params).collaboration);
  return (
    <>
      <PageTitle
        title="Add a survey"
        crumbs={[{ href: `/${actor.collaboration}/surveys`, label: 'Surveys' }, { label: 'new' }]}
        context="You lead it until somebody else does; files come in the next step"
      />
      <div className="mt-8">
        {may(actor, 'create-survey') ? (
          <SurveyForm collaboration={actor.collaboration} />
        ) : (
          <Notice tone="neutral" icon="lock" title="A collaborator or an owner adds surveys.">
            You can read every survey, copy its analyses and run the copies.
          </Notice>
        )}
      </div>
    </>
  );
}
