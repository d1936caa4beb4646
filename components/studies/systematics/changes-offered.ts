import { describeEccentricity, eccentricityChoices } from '@/components/surveys/map-setting-words';
import type { SystematicChange } from '@/lib/schemas/study-settings';
import { ruleNames } from '../overlap-rules/overlap-words';

export interface OfferedChange {
  key: string;
  change: SystematicChange;
  name: string;
  /** What the change does, in one sentence. */
  sentence: string;
}
export interface ChangeGroup {
  name: string;
  changes: OfferedChange[];
}

interface OfferOptions {
  tables: { id: string; name: string }[];
  /** Stars in several surveys can be counted in several ways. */
  hasSharedStars: boolean;
  /** The run's own rule, which would change nothing. */
  ruleInRun: string | undefined;
  /** Of an earlier answer: what a script asked and this form does not offer by itself. */
  also: SystematicChange[];
}

export function keyOf(change: SystematicChange): string {
  switch (change.change) {
    case 'cooling':
      return `cooling ${change.coolingTableId ?? 'built-in'}`;
    case 'eccentricity':
      return `eccentricity ${describeEccentricity(change.law)}`;
    case 'combination':
      return `combination ${change.rule}`;
    default:
      return change.change;
  }
}

const offer = (change: SystematicChange, name: string, sentence: string): OfferedChange => ({
  key: keyOf(change),
  change,
  name,
  sentence,
});

const stars = [
  offer(
    { change: 'ages-young' },
    'ages one sigma younger',
    'Every star takes the lower end of its age, at which its companions are brighter.',
  ),
  offer(
    { change: 'ages-old' },
    'ages one sigma older',
    'Every star takes the upper end of its age, and its companions have faded.',
  ),
  offer(
    { change: 'distances-near' },
    'distances one sigma nearer',
    'Every star moves nearer by its error: the same angle is a closer orbit.',
  ),
  offer(
    { change: 'distances-far' },
    'distances one sigma farther',
    'Every star moves farther by its error: fainter companions, wider orbits.',
  ),
];

const thresholds = [
  offer(
    { change: 'threshold' },
    'hard threshold for smooth, or smooth for hard',
    'What lies exactly at the curve is either seen always or half of the time.',
  ),
  offer(
    { change: 'n-sigma-up' },
    'threshold one sigma higher',
    'A companion must stand out by one more sigma to count as seen.',
  ),
  offer(
    { change: 'n-sigma-down' },
    'threshold one sigma lower',
    'A companion may stand out by one sigma less and still count as seen.',
  ),
];

const rules = {
  'same-position': 'The epochs of a star see the companion at one and the same position.',
  deepest: 'Of the maps of a star only the deepest counts at each node.',
  independent: 'The epochs of a star are as good as different stars, the most they could be.',
} as const;

/** What may be changed in a run, in groups; the server still says where a survey does not allow it. */
export function changesOffered(options: OfferOptions): ChangeGroup[] {
  const { tables, hasSharedStars, ruleInRun, also } = options;
  const laws = eccentricityChoices.map(({ law }) => law);
  const furtherLaws = also.flatMap((one) => (one.change === 'eccentricity' ? [one.law] : []));
  const orbits = [...laws, ...furtherLaws].map((law) =>
    offer(
      { change: 'eccentricity', law },
      describeEccentricity(law),
      law.law === 'circular'
        ? 'Every orbit is a circle.'
        : 'Eccentric orbits are followed by their time at each separation.',
    ),
  );
  const cooling = [
    offer(
      { change: 'cooling', coolingTableId: null },
      'built-in approximate law',
      'The rough law that every collaboration starts with, in the bands that it knows.',
    ),
    ...tables.map(({ id, name }) =>
      offer(
        { change: 'cooling', coolingTableId: id },
        name,
        'Masses become magnitudes by this table.',
      ),
    ),
  ];
  const groups = [
    { name: 'Stars', changes: stars },
    { name: 'Cooling', changes: cooling },
    { name: 'Threshold', changes: thresholds },
    { name: 'Eccentricities', changes: unique(orbits) },
  ];
  if (!hasSharedStars) return groups;
  const shared = (Object.keys(rules) as (keyof typeof rules)[])
    .filter((rule) => rule !== ruleInRun)
    .map((rule) => offer({ change: 'combination', rule }, ruleNames[rule], rules[rule]));
  return [...groups, { name: 'Stars in several surveys', changes: shared }];
}

function unique(changes: OfferedChange[]): OfferedChange[] {
  const seen = new Set<string>();
  return changes.filter(({ key }) => !seen.has(key) && seen.add(key));
}
