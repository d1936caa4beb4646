/** Parts of a recipe that an exercise may leave open. */
export const changeableParts = [
  'detections',
  'prior',
  'level',
  'likelihood',
  'population',
  'stars',
  'candidates',
] as const;
export type ChangeablePart = (typeof changeableParts)[number];

/** What a person reads for each part. */
export const partNames: Record<ChangeablePart, string> = {
  detections: 'which detections count',
  prior: 'the prior of the rate',
  level: 'the credible level',
  likelihood: 'the likelihood',
  population: 'the population and its ranges',
  stars: 'surveys, sample and the rule of shared stars',
  candidates: 'candidates and expected false detections',
};
