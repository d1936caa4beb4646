import type { Metadata } from 'next';
import { notFound, redirect } from 'next/navigation';
import { currentActor } from '@/app/session';
import { KnownAnswers } from '@/components/hooks/known-answers';
import { isStudyKind, kindWords, questionAddress } from '@/components/studies/kind-words';
import { StudyPage } from '@/components/studies/study-page';
import type { StudyKind } from '@/lib/schemas/study-settings';
import { listCoolingTables } from '@/lib/services/cooling-tables';
import { listPopulations } from '@/lib/services/populations';
import { answeredInputs } from '../study-inputs';

interface PageProps {
  params: Promise<{ collaboration: string; analysis: string; kind: string }>;
  searchParams: Promise<{ answer?: string }>;
}

export async function generateMetadata({ params }: PageProps): Promise<Metadata> {
  const { analysis, kind } = await params;
  return { title: isStudyKind(kind) ? `${kindWords[kind].title}, ${analysis}` : analysis };
}

export default async function FurtherQuestionPage({ params, searchParams }: PageProps) {
  const { collaboration, analysis, kind } = await params;
  if (!isStudyKind(kind)) notFound();
  const { answer } = await searchParams;
  // Some kinds have a page of their own.
  const place = questionAddress(collaboration, analysis, kind, answer);
  if (!place.includes('/studies/')) redirect(place);
  const [inputs, answers] = await Promise.all([
    answeredInputs(collaboration, analysis, kind, answer),
    offered(collaboration, kind),
  ]);
  return (
    <KnownAnswers collaboration={inputs.collaboration} answers={answers}>
      <StudyPage key={`${analysis} ${kind}`} kind={kind} answerId={answer} {...inputs} />
    </KnownAnswers>
  );
}

/** What the settings of a kind offer a choice of. */
async function offered(collaboration: string, kind: StudyKind) {
  const actor = await currentActor(collaboration);
  switch (kind) {
    case 'population-comparison':
      return { populations: (await listPopulations(actor)).populations };
    case 'systematics':
    case 'ages-cooling':
      return { 'cooling-tables': await listCoolingTables(actor) };
    default:
      return {};
  }
}
