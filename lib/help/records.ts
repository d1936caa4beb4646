import { entries } from './types';

const raw = String.raw;

export const recordWords = entries('records', {
  analysis: {
    title: 'Analysis',
    kind: 'thing',
    definition:
      'A question with its settings: surveys or a sample, population, likelihood, prior, level, what counts as a detection. It may be changed; each computation of it is a run that may not. Copying an analysis makes a draft of your own that remembers where it came from.',
    formulas: [],
    units: 'none: a thing, not a number',
    source: 'The word of this product.',
    seeAlso: ['run', 'population', 'exercise'],
  },
  run: {
    title: 'Run',
    kind: 'thing',
    definition:
      'One computation of an analysis, with the versions of everything it used. A run never changes. A newer file, age or verdict makes it “made with older inputs”, and the number stays. A live number on screen belongs to no run until it is saved as one.',
    formulas: [],
    units: 'none: a thing, not a number',
    source: 'The rule of this product: nothing changes under a result.',
    seeAlso: ['analysis', 'fingerprint', 'frozen'],
  },
  frozen: {
    title: 'Frozen',
    kind: 'thing',
    definition:
      'A run that was put aside as a result by an author: its controls may be moved, but what is saved from them is a copy. A frozen run that a second person agreed to may be released.',
    formulas: [],
    units: 'none: a state, not a number',
    source: 'The word of this product.',
    seeAlso: ['run', 'release', 'calibration'],
  },
  release: {
    title: 'Release',
    kind: 'thing',
    definition:
      'A frozen run that the public can read: statement, tables, maps, methods and fingerprints, and what replaced it. A withdrawn release stays readable, marked, with its reason.',
    formulas: [],
    units: 'none: a state, not a number',
    source: 'The word of this product.',
    seeAlso: ['frozen', 'fingerprint', 'statement'],
  },
  fingerprint: {
    title: 'Fingerprint',
    kind: 'quantity',
    definition: raw`A short hash of an input or a result. Two things with the same fingerprint are the same; if one bit differs the fingerprint does. On screen it is cut to its first digits; files carry it whole.`,
    formulas: [
      {
        tex: raw`\mathrm{SHA\text{-}256}(\text{canonical form})`,
        reads: 'SHA-256 of the value written in one canonical form',
      },
    ],
    units: '64 hexadecimal digits',
    source: 'FIPS 180-4.',
    seeAlso: ['run', 'release'],
  },
  statement: {
    title: 'Limit statement',
    kind: 'thing',
    definition:
      'A limit with everything that it depends on: quantity, ranges, population with its convention, credible level, prior with its range, stars, detections and how they count, exposure, rule of shared stars, cooling, eccentricity, threshold and what lies outside the maps. It can be taken along as text, LaTeX or JSON; in JSON levels are fractions.',
    formulas: [],
    units: 'per cent of stars, or planets per 100 stars',
    source: 'Written by one part of the code, so that figure, table and text agree.',
    seeAlso: ['upper-limit', 'credible-level', 'prior'],
  },
  exercise: {
    title: 'Exercise',
    kind: 'thing',
    definition:
      'An analysis shared with the students of a collaboration, with a task, what may be changed and a day on which it is due. Starting makes a copy of one’s own; what is handed in is a run with a remark, and handing in again is a new submission. Who set it sees every submission beside the reference.',
    formulas: [],
    units: 'none: a thing, not a number',
    source: 'The word of this product.',
    seeAlso: ['analysis', 'zero-detections', 'prior'],
  },
});
