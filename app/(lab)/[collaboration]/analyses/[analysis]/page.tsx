import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { NotesOf } from '@/app/(lab)/[collaboration]/notes-of';
import { newestRunOf } from '@/app/newest-run';
import { currentActor } from '@/app/session';
import { settingFromQuery } from '@/components/runs/live-address';
import { settingOfRecipe } from '@/components/runs/live-setting';
import { ResultScreen } from '@/components/runs/result-screen';
import type { Actor } from '@/lib/access/actor';
import { NotFound } from '@/lib/errors';
import { isPlainPowerLaw } from '@/lib/schemas/plain-power-law';
import { getAnalysis } from '@/lib/services/analyses';
import { findAgesCooling } from '@/lib/services/studies';

interface PageProps {
  params: Promise<{ collaboration: string; analysis: string }>;
  searchParams: Promise<Record<string, string | undefined>>;
}

export async function generateMetadata({ params }: PageProps): Promise<Metadata> {
  return { title: (await params).analysis };
}

export default async function AnalysisPage({ params, searchParams }: PageProps) {
  const { collaboration, analysis: key } = await params;
  const actor = await currentActor(collaboration);
  const analysis = await findAnalysis(actor, key);
  const { definition } = analysis.population;
  const asked = isPlainPowerLaw(definition)
    ? settingFromQuery(await searchParams, settingOfRecipe(analysis.recipe, definition))
    : undefined;
  const { run, runPopulation } = await newestRunOf(actor, analysis);
  const agesCooling = asked && run ? await findAgesCooling(actor, run.id) : null;
  return (
    <>
      <ResultScreen
        key={analysis.key}
        collaboration={actor.collaboration}
        analysis={analysis}
        run={run}
        runPopulation={runPopulation}
        asked={asked}
        agesCooling={agesCooling}
      />
      <NotesOf actor={actor} on={{ kind: 'analysis', key: analysis.key }} />
    </>
  );
}

async function findAnalysis(actor: Actor, key: string) {
  try {
    return await getAnalysis(actor, key);
  } catch (reason) {
    if (reason instanceof NotFound) notFound();
    throw reason;
  }
}
