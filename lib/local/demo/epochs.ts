import { createRandom, deriveSeed } from '@/lib/numerics/random';
import { julianYearOf } from '@/lib/quantities/earth-position';
import { backgroundShift, offsetOf, polarOf } from '@/lib/sensitivity/vetting';
import { DEMO_SEED, type DemoStar, type DemoSurvey } from './sky';

const round = (value: number, digits: number) => Number(value.toFixed(digits));

/** An invented proper motion [mas/yr]: some 20 km/s across the line of sight. */
export function motionOf(star: DemoStar): { pmRaMasYr: number; pmDecMasYr: number } {
  const random = createRandom(deriveSeed(DEMO_SEED, `motion ${star.name}`));
  const size = (4200 / star.distancePc) * Math.exp(0.4 * random.normal());
  const direction = 2 * Math.PI * random.uniform();
  return {
    pmRaMasYr: round(size * Math.sin(direction), 2),
    pmDecMasYr: round(size * Math.cos(direction), 2),
  };
}

export interface DemoEpoch {
  observedOn: string;
  separationArcsec: number;
  separationErrorArcsec: number;
  positionAngleDeg: number;
  positionAngleErrorDeg: number;
  band: string;
  contrastMag: number;
  contrastErrorMag: number;
}

interface DemoSource {
  survey: DemoSurvey;
  star: DemoStar;
  /** Whether it stays with its star, or stays behind. */
  isBound: boolean;
  separationArcsec: number;
  contrastMag: number;
  days: string[];
}

const ERROR_ARCSEC = 0.004;

/** Where an invented source was seen on each day, with the scatter of its errors. */
export function drawEpochs({ survey, star, isBound, days, ...source }: DemoSource): DemoEpoch[] {
  const random = createRandom(deriveSeed(DEMO_SEED, `epochs ${survey.slug} ${star.name}`));
  const start = offsetOf({
    separationArcsec: source.separationArcsec,
    positionAngleDeg: 360 * random.uniform(),
  });
  const host = {
    raDeg: star.raDeg,
    decDeg: star.decDeg,
    ...motionOf(star),
    parallaxMas: 1000 / star.distancePc,
    parallaxErrorMas: 0,
  };
  return days.map((observedOn) => {
    const [from, to] = [julianYearOf(days[0]), julianYearOf(observedOn)];
    const shift = isBound ? { eastArcsec: 0, northArcsec: 0 } : backgroundShift(host, from, to);
    const { separationArcsec, positionAngleDeg } = polarOf({
      eastArcsec: start.eastArcsec + shift.eastArcsec + ERROR_ARCSEC * random.normal(),
      northArcsec: start.northArcsec + shift.northArcsec + ERROR_ARCSEC * random.normal(),
    });
    return {
      observedOn,
      separationArcsec: round(separationArcsec, 4),
      separationErrorArcsec: ERROR_ARCSEC,
      positionAngleDeg: round(positionAngleDeg, 2) % 360,
      positionAngleErrorDeg: round((ERROR_ARCSEC / separationArcsec) * (180 / Math.PI), 2),
      band: survey.band,
      contrastMag: round(source.contrastMag + 0.08 * random.normal(), 2),
      contrastErrorMag: 0.1,
    };
  });
}
