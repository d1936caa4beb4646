import { type RateQuantity, type StatedCandidates, setAside } from '@/lib/inference';
import { isInside } from '@/lib/population';
import type { DrawnInputs, DrawnResult } from '@/lib/schemas/runs';
import type { AgesCoolingAnswer } from '@/lib/schemas/studies';
import type { Beside } from './beside-table';
import { agesInWords, coolingInWords } from './input-words';
import { type LimitAnswer, savedAnswer } from './limit-answer';
import { isSameSetting, type LiveSetting, quantityOf } from './live-setting';
import type { LiveOutcome } from './use-live-result';

/** What a result shows: of the present setting where it has an answer, otherwise of the run. */
export interface ShownResult {
  /** The setting that the numbers belong to. */
  setting: LiveSetting;
  quantity: RateQuantity;
  answer: LimitAnswer;
  zero: LimitAnswer;
  levels(): DrawnResult['levels'];
  atTenthOfFloor: number | null;
  counted: { name: string; starId: string }[];
  /** Candidates without an answer, and what the limit did with them; undefined: there are none. */
  candidates: StatedCandidates | undefined;
  /** Why the table of limits lacks a column; null: it has both. */
  missingColumn: string | null;
  /** Limits without a prior; null where the run is from before they were kept. */
  beside(): Beside | null;
  /** Names of confirmed companions outside the ranges, and of second ones of a star. */
  outside: string[];
  merged: string[];
  exposure: number;
  /** The cooling model, and what is done with ages where they are not the run's. */
  cooling: string;
  ages: string | null;
  shareOutsideMaps: number;
  /** Shape [star]; undefined until the maps are there. */
  view: LiveOutcome['view'];
  saved: {
    answer: LimitAnswer;
    quantity: RateQuantity;
    credibleLevel: number;
    /** More than the level differs from what is shown. */
    hasOtherSettings: boolean;
  };
  /** The present setting is not the run's. */
  isLive: boolean;
  /** The present setting has no answer of its own (yet): the run's stands in its place. */
  isOfRun: boolean;
}

export function showResult(
  inputs: DrawnInputs,
  result: DrawnResult,
  inRun: LiveSetting,
  setting: LiveSetting,
  outcome: LiveOutcome | undefined,
  models?: AgesCoolingAnswer['result']['models'],
): ShownResult {
  const { credibleLevel } = inRun;
  const saved = {
    ...{
      answer: savedAnswer(result.answer),
      quantity: quantityOf(inRun.likelihood),
      credibleLevel,
    },
    hasOtherSettings: !isSameSetting({ ...setting, credibleLevel }, inRun),
  };
  const isLive = !isSameSetting(setting, inRun);
  const live = outcome?.live;
  if (!live) {
    return {
      setting: inRun,
      quantity: saved.quantity,
      answer: saved.answer,
      zero: savedAnswer(result.zero),
      levels: () => result.levels,
      atTenthOfFloor: result.atTenthOfFloor,
      candidates: storedCandidates(inputs, result),
      missingColumn: storedReason(result),
      beside: () => result.beside,
      counted: result.counted,
      outside: result.outside.map(({ name }) => name),
      merged: result.mergedNames,
      exposure: result.exposure,
      cooling: inputs.cooling,
      ages: null,
      shareOutsideMaps: result.shareOutsideMaps,
      view: undefined,
      saved,
      isLive,
      isOfRun: isLive,
    };
  }
  const { full } = live;
  return {
    setting,
    quantity: quantityOf(setting.likelihood),
    answer: live.answer,
    zero: live.zero,
    levels: live.levels,
    atTenthOfFloor: live.atTenthOfFloor,
    candidates: liveCandidates(inputs, setting, full.undecided),
    missingColumn: live.missingColumn,
    beside: live.beside,
    counted: full.counted.map(({ name, star }) => ({ name, starId: inputs.stars[star].starId })),
    outside: inputs.companions
      .filter((one) => !isInside(setting.definition, one.massMjup, one.semiMajorAxisAu))
      .map(({ name }) => name),
    merged: full.setAside.flatMap((one) =>
      one.reason === 'star-already-counted' ? [one.detection.name] : [],
    ),
    exposure: full.exposure,
    cooling: coolingInWords(inputs.cooling, setting, models),
    ages: agesInWords(setting),
    shareOutsideMaps: full.shareOutsideMap,
    view: outcome.view,
    saved,
    isLive,
    isOfRun: false,
  };
}

/** Candidates without an answer, and what the run itself did with them. */
export function storedCandidates(inputs: DrawnInputs, { candidates }: DrawnResult) {
  return candidates ?? setAside(inputs.undecided);
}

/** By the present ranges, where a candidate's place is known. */
function liveCandidates(
  inputs: DrawnInputs,
  { candidates, detections, definition }: LiveSetting,
  counted: StatedCandidates['entries'],
): StatedCandidates | undefined {
  if (candidates && detections !== 'none') {
    const referenceRate = candidates.treatment === 'fixed' ? null : candidates.referenceRate;
    return { treatment: candidates.treatment, referenceRate, entries: counted };
  }
  return setAside(inputs.undecided, ({ massMjup, semiMajorAxisAu, insideRanges }) =>
    massMjup == null || semiMajorAxisAu == null
      ? insideRanges !== false
      : isInside(definition, massMjup, semiMajorAxisAu),
  );
}

const TABLE = 'Table of limits: ';

function storedReason({ statement }: DrawnResult): string | null {
  return statement.conditions.find((one) => one.startsWith(TABLE))?.slice(TABLE.length) ?? null;
}
