import type { Metadata } from 'next';
import { drawnRun } from '@/app/drawn-run';
import { isFinished } from '@/app/newest-run';
import { currentActor } from '@/app/session';
import { readSides, writeSide } from '@/components/compare/address';
import { CompareScreen } from '@/components/compare/compare-screen';
import { listAnalyses } from '@/lib/services/analyses';
import { findPopulationsById } from '@/lib/services/populations';

export const metadata: Metadata = { title: 'Comparison' };

export default async function ComparePage({
  params,
  searchParams,
}: {
  params: Promise<{ collaboration: string }>;
  searchParams: Promise<Record<string, string | string[] | undefined>>;
}) {
  const actor = await currentActor((await params).collaboration);
  const { analyses } = await listAnalyses(actor);
  const asked = (await searchParams).with;
  const wanted = readSides(Array.isArray(asked) ? asked.join() : asked);
  const sides = await Promise.all(
    wanted.map(async (address) => {
      const analysis = analyses.find(({ key }) => key === address.key) ?? null;
      const finished = analysis?.runs.filter(isFinished);
      const run = finished?.find(
        ({ number }) => address.run === undefined || number === address.run,
      );
      return {
        address,
        analysis,
        run: analysis && run ? await drawnRun(actor, analysis, run) : null,
      };
    }),
  );
  const used = sides.flatMap(({ run }) => run?.populationId ?? []);
  const populations = await findPopulationsById(actor, used);
  const choices = analyses.flatMap(({ key, name, runs }) =>
    runs.filter(isFinished).map(({ number }, index) => ({
      value: index === 0 ? key : `${key}.${number}`,
      label: index === 0 ? `${key}: ${name}` : `${key}, run ${number}: ${name}`,
    })),
  );
  return (
    <CompareScreen
      key={wanted.map(writeSide).join()}
      collaboration={actor.collaboration}
      choices={choices}
      sides={sides.map((side) => ({
        ...side,
        population: populations.get(side.run?.populationId ?? '') ?? null,
      }))}
    />
  );
}
