import type { Metadata } from 'next';
import { StudyPage } from '@/components/studies/study-page';
import { answeredInputs } from '../studies/study-inputs';

interface PageProps {
  params: Promise<{ collaboration: string; analysis: string }>;
  searchParams: Promise<{ answer?: string }>;
}

export async function generateMetadata({ params }: PageProps): Promise<Metadata> {
  return { title: `Calibration, ${(await params).analysis}` };
}

export default async function CalibrationPage({ params, searchParams }: PageProps) {
  const { collaboration, analysis } = await params;
  const { answer } = await searchParams;
  const inputs = await answeredInputs(collaboration, analysis, 'calibration', answer);
  return <StudyPage key={analysis} kind="calibration" answerId={answer} {...inputs} />;
}
