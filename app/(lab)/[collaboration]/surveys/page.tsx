import type { Metadata } from 'next';
import { currentActor } from '@/app/session';
import { SharingSection } from '@/components/sharing/sharing-section';
import { SurveyListPanel } from '@/components/surveys/survey-list';
import { LinkButton } from '@/components/ui/link-button';
import { PageTitle } from '@/components/ui/page-title';
import { may } from '@/lib/access/permissions';
import { listShares } from '@/lib/services/sharing/shares';
import { listSurveys } from '@/lib/services/surveys';

export const metadata: Metadata = { title: 'Surveys' };

export default async function SurveysPage({
  params,
}: {
  params: Promise<{ collaboration: string }>;
}) {
  const actor = await currentActor((await params).collaboration);
  const [list, shares] = await Promise.all([listSurveys(actor), listShares(actor)]);
  const canAdd = may(actor, 'create-survey');
  return (
    <>
      <PageTitle
        title="Surveys"
        context={
          list.surveys.length > 0 &&
          `${list.entries} entries, ${list.stars} stars; a star in several surveys counts once`
        }
        actions={
          list.surveys.length > 0 && (
            <>
              <LinkButton href={`/${actor.collaboration}/stars/samples`}>Samples</LinkButton>
              <LinkButton href={`/${actor.collaboration}/maps`}>Maps</LinkButton>
              <LinkButton href={`/${actor.collaboration}/cooling`}>Cooling</LinkButton>
              {list.surveys.length > 1 && (
                <LinkButton href={`/${actor.collaboration}/surveys/combine`}>Combine</LinkButton>
              )}
              {canAdd && (
                <LinkButton
                  href={`/${actor.collaboration}/surveys/new`}
                  variant="primary"
                  icon="add"
                >
                  Add a survey
                </LinkButton>
              )}
            </>
          )
        }
      />
      <div className="mt-2">
        <SurveyListPanel collaboration={actor.collaboration} initial={list} canAdd={canAdd} />
      </div>
      <SharingSection collaboration={actor.collaboration} initial={shares} />
    </>
  );
}
