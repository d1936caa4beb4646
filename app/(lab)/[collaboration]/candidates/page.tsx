import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { currentActor } from '@/app/session';
import { CandidateListPanel } from '@/components/candidates/candidate-list';
import { PageTitle } from '@/components/ui/page-title';
import { NotFound } from '@/lib/errors';
import { companionStatusSchema } from '@/lib/schemas/candidates';
import { listCandidates } from '@/lib/services/candidates/list';
import { listSurveys } from '@/lib/services/surveys';

export const metadata: Metadata = { title: 'Candidates' };

const FIRST_PAGE = { limit: 500, offset: 0 };

interface CandidatesPageProps {
  params: Promise<{ collaboration: string }>;
  searchParams: Promise<Record<string, string | string[] | undefined>>;
}

export default async function CandidatesPage({ params, searchParams }: CandidatesPageProps) {
  const actor = await currentActor((await params).collaboration);
  const asked = await searchParams;
  const status = companionStatusSchema.safeParse(asked.status);
  const filter = {
    ...(typeof asked.survey === 'string' && { survey: asked.survey }),
    ...(status.success && { status: status.data }),
  };
  try {
    const [list, { surveys }] = await Promise.all([
      listCandidates(actor, { ...filter, ...FIRST_PAGE }),
      listSurveys(actor),
    ]);
    const open = list.counts.candidate + list.counts.ambiguous;
    return (
      <>
        <PageTitle
          title="Candidates"
          context={open === 1 ? '1 waits for a verdict' : `${open} wait for a verdict`}
        />
        <CandidateListPanel
          collaboration={actor.collaboration}
          initial={list}
          surveys={surveys.map(({ slug, name }) => ({ slug, name }))}
          filter={filter}
        />
      </>
    );
  } catch (error) {
    if (error instanceof NotFound) notFound();
    throw error;
  }
}
