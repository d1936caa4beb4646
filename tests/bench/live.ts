import { liveAnswer } from '@/components/runs/live-answer';
import type { LiveSample } from '@/components/runs/live-sample';
import { LiveViews } from '@/components/runs/live-views';
import {
  type AnswerSettings,
  answerFromView,
  contractStillAxis,
  viewPopulation,
} from '@/lib/inference';
import { populationWeights } from '@/lib/population';
import type { Amount } from './amount';
import { LEVEL, referenceLimit, relativeError } from './posterior';
import type { Errors, Line, Target } from './report';
import { shareOf } from './rounds';
import { GRID, type MappedSurvey, mapSurvey, POPULATION } from './survey';

const FRAME_MS = 16.7;
const MOST_OF_FRAME: Readonly<Record<number, number>> = { 400: 0.05, 5000: 0.25 };

function targetsFor(stars: number): Target[] {
  const must = MOST_OF_FRAME[stars];
  return must === undefined ? [] : [{ of: 'ratio', bound: 'at most', must }];
}

function linesOf(survey: MappedSurvey, rounds: number): Line[] {
  const { stars, maps, detections } = survey;
  const prior = { law: 'uniform', max: 1 } as const;
  const asked: AnswerSettings = {
    likelihood: 'host-fraction',
    prior,
    detections,
    level: LEVEL,
  };
  const view = viewPopulation(maps, GRID, POPULATION);
  const look = () => viewPopulation(maps, GRID, POPULATION);
  const { semiMajorAxis } = populationWeights(GRID, POPULATION);
  const take = () => contractStillAxis(maps, GRID, 'mass', semiMajorAxis);
  const sample: LiveSample = { grid: GRID, stars: [], maps, companions: detections, open: [] };
  const setting = {
    definition: POPULATION,
    credibleLevel: LEVEL,
    detections: 'counted',
    likelihood: asked.likelihood,
    prior,
  } as const;
  const { limit } = answerFromView(view, asked);
  const errors: Errors = { limit: relativeError(limit, referenceLimit(survey)) };
  const measured = (name: string, run: () => number, of: Errors, targets: Target[]): Line => {
    shareOf({ run, leastMs: 150 }, FRAME_MS, 1);
    return {
      name: `live, ${name}`,
      stars,
      ...shareOf({ run, leastMs: 50 }, FRAME_MS, rounds),
      unit: 'share',
      yardstick: `one frame, ${FRAME_MS} ms`,
      errors: of,
      targets,
    };
  };
  const targets = targetsFor(stars);
  const views = new LiveViews(sample);
  let turn = 0;
  const drag = () => {
    turn += 1;
    return views.of({ ...POPULATION, massIndex: POPULATION.massIndex + (turn % 2) * 1e-9 });
  };
  return [
    measured('view of the population', () => look().exposure, {}, []),
    measured('an axis is taken, once a drag', () => take().values[0], {}, []),
    measured('prior moves', () => answerFromView(view, asked).limit, errors, targets),
    measured('population moves', () => answerFromView(look(), asked).limit, errors, targets),
    measured('one axis moves', () => answerFromView(drag(), asked).limit, errors, targets),
    measured(
      'all that the page shows, one axis moves',
      () => liveAnswer(sample, drag(), setting).answer.limit,
      errors,
      targets,
    ),
    measured(
      'all that the page shows',
      () => liveAnswer(sample, look(), setting).answer.limit,
      errors,
      targets,
    ),
  ];
}

/** What follows a control while it moves, as a share of one frame of the screen. */
export function liveLines({ rounds }: Amount): Line[] {
  const surveys = [5000, 500, 400, 78].map(mapSurvey).reverse();
  return surveys.flatMap((survey) => linesOf(survey, rounds));
}
