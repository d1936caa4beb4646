import type { MapSettings } from '@/lib/schemas/sensitivity';

type Law = MapSettings['eccentricity'];

/** Laws offered on the form; scripts may state others. */
export const eccentricityChoices: { law: Law; words: string }[] = [
  { law: { law: 'uniform', max: 0.95 }, words: 'uniform from 0 to 0.95' },
  { law: { law: 'circular' }, words: 'circular orbits' },
  {
    law: { law: 'beta', alpha: 0.867, beta: 3.03 },
    words: 'Beta(0.867, 3.03), as of radial-velocity planets',
  },
  { law: { law: 'beta', alpha: 30, beta: 200 }, words: 'Beta(30, 200), as of imaged planets' },
  { law: { law: 'rayleigh', sigma: 0.3 }, words: 'Rayleigh, σ 0.3' },
];

export function describeEccentricity(law: Law): string {
  switch (law.law) {
    case 'circular':
      return 'circular orbits';
    case 'fixed':
      return `eccentricity ${law.eccentricity}`;
    case 'uniform':
      return `eccentricities uniform from 0 to ${law.max}`;
    case 'beta':
      return `eccentricities Beta(${law.alpha}, ${law.beta})`;
    case 'rayleigh':
      return `eccentricities Rayleigh, σ ${law.sigma}`;
  }
}

/** One line: with which settings the survey's curves become maps. */
export function describeMapSettings(settings: MapSettings, coolingName: string | null): string {
  const cooling =
    settings.cooling.kind === 'built-in'
      ? 'approximate cooling law'
      : (coolingName ?? 'cooling table');
  return [
    cooling,
    describeEccentricity(settings.eccentricity),
    `${settings.threshold} threshold`,
    ...describeRules(settings),
  ].join('; ');
}

/** The rules that are switched on, each in a few words. */
function describeRules(settings: MapSettings): string[] {
  const { smallSample, unstableZone, candidates, candidateHalfWidthArcsec, fieldAge } = settings;
  const words: string[] = [];
  if (smallSample) words.push(`thresholds raised for elements of ${smallSample.fwhmArcsec}″`);
  if (unstableZone === 'remove') words.push('unstable orbits taken out');
  if (candidates === 'cut') words.push(`cut ${candidateHalfWidthArcsec}″ around candidates`);
  if (fieldAge) words.push(`field age ${fieldAge.minMyr}–${fieldAge.maxMyr} Myr`);
  return words;
}

/** Each setting by its label, to be read beside those of somebody else. */
export function mapSettingsWords(
  settings: MapSettings,
  tables: readonly { id: string; name: string }[],
): Record<string, string> {
  const { cooling, massMjup, semiMajorAxisAu, massOutsideTable, ageOutsideTable } = settings;
  const table = cooling.kind === 'table' && tables.find(({ id }) => id === cooling.coolingTableId);
  return {
    'Cooling relation': cooling.kind === 'built-in' ? 'built in' : table ? table.name : 'a table',
    Eccentricities: describeEccentricity(settings.eccentricity),
    'Detection at the threshold': settings.threshold,
    Rules: describeRules(settings).join('; ') || 'none',
    'Outside the table': `mass ${massOutsideTable}, age ${ageOutsideTable}`,
    Masses: axisWords(massMjup, 'M_Jup'),
    'Semi-major axes': axisWords(semiMajorAxisAu, 'au'),
  };
}

const axisWords = ({ min, max, count }: MapSettings['massMjup'], unit: string) =>
  `${count} from ${min} to ${max} ${unit}`;
