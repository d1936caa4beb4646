import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { currentActor } from '@/app/session';
import { ForecastScreen } from '@/components/studies/forecast/forecast-screen';
import type { Actor } from '@/lib/access/actor';
import { may } from '@/lib/access/permissions';
import { NotFound } from '@/lib/errors';
import { getStudy } from '@/lib/services/studies';
import { studyInputs } from '../../analyses/[analysis]/studies/study-inputs';

export const metadata: Metadata = { title: 'Forecast' };

export default async function ForecastPage({
  params,
}: {
  params: Promise<{ collaboration: string; forecast: string }>;
}) {
  const { collaboration, forecast } = await params;
  const actor = await currentActor(collaboration);
  const study = await findForecast(actor, forecast);
  const inputs = await studyInputs(collaboration, study.run.analysisKey);
  return (
    <ForecastScreen
      key={study.id}
      study={study}
      canAsk={may(actor, 'run-analysis', { isOwn: true })}
      {...inputs}
    />
  );
}

async function findForecast(actor: Actor, id: string) {
  try {
    const study = await getStudy(actor, id);
    if (study.settings.kind !== 'forecast') notFound();
    return study;
  } catch (reason) {
    if (reason instanceof NotFound) notFound();
    throw reason;
  }
}
