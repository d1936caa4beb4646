import type { Metadata } from 'next';
import { isFinished } from '@/app/newest-run';
import { currentActor } from '@/app/session';
import { CompareScreen } from '@/components/analyses/compare-screen';
import { listAnalyses } from '@/lib/services/analyses';
import { findPopulationsById } from '@/lib/services/populations';
import { getRun } from '@/lib/services/runs';

export const metadata: Metadata = { title: 'Comparison' };

export default async function ComparePage({
  params,
  searchParams,
}: {
  params: Promise<{ collaboration: string }>;
  searchParams: Promise<Record<string, string | undefined>>;
}) {
  const actor = await currentActor((await params).collaboration);
  const { analyses } = await listAnalyses(actor);
  const wanted = ((await searchParams).with ?? '').split(',').filter((key) => key !== '');
  const sides = await Promise.all(
    wanted.slice(0, 2).map(async (key) => {
      const analysis = analyses.find((one) => one.key === key);
      const finished = analysis?.runs.find(isFinished);
      if (!analysis || !finished) return { key, analysis: analysis ?? null, run: null };
      return { key, analysis, run: await getRun(actor, finished.id) };
    }),
  );
  const used = sides.flatMap(({ run }) => run?.inputs?.population.id ?? []);
  const populations = await findPopulationsById(actor, used);
  return (
    <CompareScreen
      key={wanted.join()}
      collaboration={actor.collaboration}
      choices={analyses
        .filter((analysis) => analysis.runs.some(isFinished))
        .map(({ key, name }) => ({ key, name }))}
      sides={sides.map((side) => ({
        ...side,
        population: populations.get(side.run?.inputs?.population.id ?? '') ?? null,
      }))}
    />
  );
}
