import type { ResultOf } from '@/lib/schemas/study-results';
import {
  type CalibrationMergeInput,
  type CalibrationPlan,
  type CalibrationPlanInput,
  calibratePart,
  mergeParts,
  planCalibration,
} from '../answers/calibration';
import { answerCounts, type CountsInput } from '../answers/counts';
import { answerForecast, type ForecastInput } from '../answers/forecast';
import { answerFreeIndices, type FreeIndicesInput } from '../answers/free-indices';
import { answerInfluence, type InfluenceInput, type InfluenceOutput } from '../answers/influence';
import { answerLimit, type LimitOutput } from '../answers/limit';
import { answerLimitMap, type LimitMapInput } from '../answers/limit-map';
import { answerComparison, type ComparisonInput } from '../answers/population-comparison';
import type { RunQuestion } from '../answers/run-question';
import { answerSweep, type SweepInput } from '../answers/sweep';

/** Every part of a study that a thread performs, by name. */
export interface StudyTasks {
  limit: { input: RunQuestion; output: LimitOutput };
  influence: { input: InfluenceInput; output: InfluenceOutput };
  'free-indices': { input: FreeIndicesInput; output: ResultOf<'free-indices'> };
  counts: { input: CountsInput; output: ResultOf<'counts'> };
  forecast: { input: ForecastInput; output: ReturnType<typeof answerForecast> };
  'calibration-plan': { input: CalibrationPlanInput; output: CalibrationPlan };
  'calibration-part': {
    input: Parameters<typeof calibratePart>[0];
    output: ReturnType<typeof calibratePart>;
  };
  'calibration-merge': { input: CalibrationMergeInput; output: ResultOf<'calibration'> };
  'limit-map': { input: LimitMapInput; output: ResultOf<'limit-map'> };
  sweep: { input: SweepInput; output: ResultOf<'sweep'> };
  'population-comparison': {
    input: ComparisonInput;
    output: ReturnType<typeof answerComparison>;
  };
}

type Answers = {
  [Name in keyof StudyTasks]: (input: StudyTasks[Name]['input']) => StudyTasks[Name]['output'];
};

const answers: Answers = {
  limit: answerLimit,
  influence: answerInfluence,
  'free-indices': answerFreeIndices,
  counts: answerCounts,
  forecast: answerForecast,
  'calibration-plan': planCalibration,
  'calibration-part': calibratePart,
  'calibration-merge': mergeParts,
  'limit-map': answerLimitMap,
  sweep: answerSweep,
  'population-comparison': answerComparison,
};

export type StudyTask = {
  [Name in keyof StudyTasks]: { name: Name; input: StudyTasks[Name]['input'] };
}[keyof StudyTasks];
export type StudyAnswer = StudyTasks[keyof StudyTasks]['output'];

export default function answerStudy({ name, input }: StudyTask): StudyAnswer {
  return (answers[name] as (input: unknown) => StudyAnswer)(input);
}
