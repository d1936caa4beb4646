import type { Actor } from '@/lib/access/actor';
import type { RatePriorInput } from '@/lib/schemas/analyses';
import type { PopulationView } from '@/lib/schemas/populations';
import { copyAnalysis, createAnalysis, updateAnalysis } from '@/lib/services/analyses';
import { createPopulation } from '@/lib/services/populations';
import { startRun } from '@/lib/services/runs';
import { askFurther } from './questions';

interface Ranges {
  mass: [number, number];
  axis: [number, number];
}

function makePopulation(actor: Actor, name: string, ranges: Ranges, isShared: boolean) {
  return createPopulation(actor, {
    name,
    note: 'Invented for the demonstration.',
    convention: 'linear',
    isShared,
    definition: {
      form: 'power-law',
      massMinMjup: ranges.mass[0],
      massMaxMjup: ranges.mass[1],
      semiMajorAxisMinAu: ranges.axis[0],
      semiMajorAxisMaxAu: ranges.axis[1],
      massIndex: -1.3,
      semiMajorAxisIndex: -0.6,
    },
  });
}

export interface DemoAnalyses {
  actors: { statistician: Actor; student: Actor };
  surveyIds: Record<'sandbar' | 'halyard' | 'petrel' | 'curlew', string>;
  /** Waits until a run has ended, and fails when it has no result. */
  finish(jobId: string): Promise<void>;
}

/**
 * Asks the demonstration's questions. The lead analysis is run once for each survey that joined, so
 * that its history is a history; every number comes from the engine.
 */
export async function askQuestions({
  actors,
  surveyIds,
  finish,
}: DemoAnalyses): Promise<{ leadAnalysisId: string }> {
  const { statistician, student } = actors;
  const { sandbar, halyard, petrel, curlew } = surveyIds;
  const uniform: RatePriorInput = { law: 'uniform', max: 1 };
  const wide = await makePopulation(
    statistician,
    'Wide orbits',
    { mass: [2, 30], axis: [200, 800] },
    false,
  );
  const massive = await makePopulation(
    statistician,
    'Massive planets',
    { mass: [5, 30], axis: [20, 300] },
    false,
  );
  const broken = await createPopulation(statistician, {
    name: 'Few beyond 60 AU',
    note: 'Invented for the demonstration.',
    convention: 'linear',
    isShared: false,
    definition: {
      form: 'shaped',
      massMinMjup: 2,
      massMaxMjup: 30,
      semiMajorAxisMinAu: 20,
      semiMajorAxisMaxAu: 300,
      mass: { shape: 'power-law', index: -1.3 },
      semiMajorAxis: {
        shape: 'broken-power-law',
        breakAt: 60,
        innerIndex: -0.4,
        outerIndex: -2.2,
      },
    },
  });
  const single = await makePopulation(
    statistician,
    'Single power laws',
    { mass: [2, 30], axis: [20, 300] },
    true,
  );

  const recipe = (population: PopulationView, ids: string[], prior: RatePriorInput = uniform) => ({
    surveyIds: ids,
    populationId: population.id,
    likelihood: 'host-fraction' as const,
    prior,
    credibleLevel: 0.95,
    detections: 'counted' as const,
    combination: 'default' as const,
    zeroOutsideMaps: false,
  });
  const run = async (actor: Actor, key: string) => {
    const started = await startRun(actor, key);
    await finish(started.job.id);
    return started.id;
  };

  const sets = [
    [sandbar],
    [sandbar, halyard],
    [sandbar, halyard, petrel],
    [sandbar, halyard, petrel, curlew],
  ];
  const lead = await createAnalysis(statistician, {
    name: 'Giant planets at 20–300 AU, four surveys',
    recipe: recipe(single, sets[0]),
  });
  let leadRunId = '';
  for (const [step, ids] of sets.entries()) {
    if (step > 0) await updateAnalysis(statistician, lead.key, { recipe: recipe(single, ids) });
    leadRunId = await run(statistician, lead.key);
  }
  const zero = await copyAnalysis(student, lead.key, {
    name: 'The same with zero detections',
    detections: 'none',
  });
  await run(student, zero.key);

  const all = sets[3];
  const others = [
    { name: 'Wide orbits', recipe: recipe(wide, all) },
    { name: 'Massive planets only', recipe: recipe(massive, all) },
    {
      name: 'Jeffreys prior on the host fraction',
      recipe: recipe(single, all, { law: 'jeffreys' }),
    },
    {
      name: 'Planets per star, Poisson',
      recipe: { ...recipe(single, all), likelihood: 'mean-number' as const },
    },
  ];
  for (const other of others) {
    const made = await createAnalysis(statistician, other);
    await run(statistician, made.key);
  }
  await askFurther(statistician, leadRunId, [broken.id], finish);
  return { leadAnalysisId: lead.id };
}
