import { createRandom, deriveSeed, type RandomStream } from '@/lib/numerics/random';

/** Everything here is invented: stars, groups, surveys and people exist in the demonstration only. */
export const DEMO_SEED = 'breakwater';

export interface DemoSurvey {
  slug: string;
  name: string;
  band: 'H' | 'K' | 'L';
  from: number;
  to: number;
  lead: string;
  description: string;
  /** Deepest contrast [mag] far from the star, and where the curve begins and ends [arcsec]. */
  floorMag: number;
  innerArcsec: number;
  outerArcsec: number;
}

export const demoSurveys: DemoSurvey[] = [
  {
    slug: 'sandbar',
    name: 'SANDBAR',
    band: 'H',
    from: 2009,
    to: 2014,
    lead: 'linhart',
    description: 'First search of the nearest young stars.',
    floorMag: 12.1,
    innerArcsec: 0.22,
    outerArcsec: 5.5,
  },
  {
    slug: 'halyard',
    name: 'HALYARD',
    band: 'H',
    from: 2015,
    to: 2019,
    lead: 'marrand',
    description: 'Young stars of type A to M.',
    floorMag: 13.4,
    innerArcsec: 0.12,
    outerArcsec: 3.2,
  },
  {
    slug: 'petrel',
    name: 'PETREL',
    band: 'L',
    from: 2017,
    to: 2023,
    lead: 'vesk',
    description: 'Nearby stars at longer wavelength.',
    floorMag: 10.9,
    innerArcsec: 0.15,
    outerArcsec: 2.6,
  },
  {
    slug: 'curlew',
    name: 'CURLEW',
    band: 'K',
    from: 2020,
    to: 2025,
    lead: 'orlu',
    description: 'The deepest imaging of the youngest groups.',
    floorMag: 14.4,
    innerArcsec: 0.1,
    outerArcsec: 1.9,
  },
];

/** How many stars each set of surveys holds: 287 stars, 340 entries. */
const overlaps: [string[], number][] = [
  [['petrel'], 80],
  [['curlew'], 74],
  [['halyard'], 52],
  [['sandbar'], 32],
  [['halyard', 'petrel'], 23],
  [['halyard', 'sandbar'], 10],
  [['halyard', 'curlew'], 7],
  [['halyard', 'petrel', 'sandbar'], 4],
  [['petrel', 'curlew'], 3],
  [['petrel', 'sandbar'], 2],
];

interface Group {
  name: string;
  share: number;
  ageMyr: number;
  errorMyr: number;
  nearPc: number;
  farPc: number;
}

const groups: Group[] = [
  { name: 'Halcyon group', share: 0.23, ageMyr: 24, errorMyr: 3, nearPc: 32, farPc: 76 },
  { name: 'Ostrea association', share: 0.12, ageMyr: 16, errorMyr: 2, nearPc: 95, farPc: 150 },
  { name: 'Meridian stream', share: 0.2, ageMyr: 45, errorMyr: 5, nearPc: 25, farPc: 66 },
  { name: 'Farne moving group', share: 0.2, ageMyr: 150, errorMyr: 20, nearPc: 12, farPc: 52 },
];

/** Mass, type and absolute magnitudes of main-sequence-like hosts, smoothed by hand for the demonstration. */
const hosts: [type: string, massMsun: number, magH: number, magK: number, magL: number][] = [
  ['A5', 1.9, 1.5, 1.5, 1.45],
  ['F0', 1.55, 2.1, 2.05, 2.0],
  ['F6', 1.28, 2.7, 2.65, 2.6],
  ['G2', 1.02, 3.35, 3.3, 3.25],
  ['G8', 0.92, 3.7, 3.62, 3.55],
  ['K1', 0.83, 4.05, 3.95, 3.88],
  ['K5', 0.7, 4.55, 4.42, 4.32],
  ['K7', 0.62, 4.95, 4.8, 4.68],
  ['M1', 0.5, 5.6, 5.4, 5.22],
  ['M4', 0.27, 7.1, 6.85, 6.6],
];

export interface DemoStar {
  name: string;
  surveys: string[];
  raDeg: number;
  decDeg: number;
  gaiaDr3Id: string;
  distancePc: number;
  distanceErrorPc: number;
  ageMyr: number;
  ageErrorMyr: number;
  group: string | null;
  spectralType: string;
  hostMassMsun: number;
  apparent: Record<'H' | 'K' | 'L', number>;
}

const pad = (value: number, width: number) => String(value).padStart(width, '0');

function nameOf(raDeg: number, decDeg: number): string {
  const hours = raDeg / 15;
  const minutes = Math.floor((hours % 1) * 60);
  const size = Math.abs(decDeg);
  const sign = decDeg < 0 ? '-' : '+';
  return `NTY ${pad(Math.floor(hours), 2)}${pad(minutes, 2)}${sign}${pad(Math.floor(size), 2)}${pad(Math.floor((size % 1) * 60), 2)}`;
}

const round = (value: number, digits: number) => Number(value.toFixed(digits));

export function drawStar(
  random: RandomStream,
  surveys: string[],
  fixed?: { raDeg: number; decDeg: number },
): DemoStar {
  const raDeg = fixed?.raDeg ?? round(random.uniform() * 360, 5);
  const decDeg = fixed?.decDeg ?? round((Math.asin(2 * random.uniform() - 1) * 180) / Math.PI, 5);
  const pick = random.uniform();
  let reached = 0;
  const group = groups.find((candidate) => {
    reached += candidate.share;
    return pick < reached;
  });
  const chosen = fixed ? groups[0] : group;
  const distancePc = chosen
    ? chosen.nearPc + (chosen.farPc - chosen.nearPc) * random.uniform()
    : 8 + 50 * Math.sqrt(random.uniform());
  const ageMyr = chosen ? chosen.ageMyr : Math.exp(Math.log(130) + Math.log(6) * random.uniform());
  const [spectralType, massMsun, magH, magK, magL] =
    hosts[Math.min(hosts.length - 1, Math.floor(random.uniform() ** 0.85 * hosts.length))];
  const modulus = 5 * Math.log10(distancePc) - 5;
  const scatter = 0.15 * random.normal();
  return {
    name: nameOf(raDeg, decDeg),
    surveys,
    raDeg,
    decDeg,
    gaiaDr3Id: `${1 + Math.floor(random.uniform() * 8)}${pad(Math.floor(random.uniform() * 1e9), 9)}${pad(Math.floor(random.uniform() * 1e9), 9)}`,
    distancePc: round(distancePc, 2),
    distanceErrorPc: round(distancePc * (0.002 + 0.004 * random.uniform()), 3),
    ageMyr: round(ageMyr, 0),
    ageErrorMyr: chosen ? chosen.errorMyr : round(ageMyr * 0.38, 0),
    group: chosen?.name ?? null,
    spectralType,
    hostMassMsun: massMsun,
    apparent: {
      H: round(magH + modulus + scatter, 3),
      K: round(magK + modulus + scatter, 3),
      L: round(magL + modulus + scatter, 3),
    },
  };
}

/** The two hosts of the demonstration, and the star of its unvetted candidate. */
export const hostPlaces = {
  first: { raDeg: 309.35, decDeg: -8.3 },
  second: { raDeg: 156.1, decDeg: 4.79 },
};

/** 287 stars in 340 entries; two of them are hosts, in the surveys that found their companions. */
export function drawSky(): DemoStar[] {
  const stars: DemoStar[] = [];
  const taken = new Set<string>();
  overlaps.forEach(([surveys, count], set) => {
    for (let i = 0; i < count; i++) {
      const isFirst = surveys.join() === 'halyard,petrel' && i === 0;
      const isSecond = surveys.join() === 'curlew' && i === 0;
      const fixed = isFirst ? hostPlaces.first : isSecond ? hostPlaces.second : undefined;
      for (let attempt = 0; ; attempt++) {
        const random = createRandom(deriveSeed(DEMO_SEED, `star ${set} ${i} ${attempt}`));
        const star = drawStar(random, surveys, fixed);
        if (taken.has(star.name)) continue;
        taken.add(star.name);
        stars.push(star);
        break;
      }
    }
  });
  return stars;
}
