import { distancePcFromParallax } from '@/lib/quantities/magnitudes';
import { notNegative, positive, refused, type TableReading } from './reading';

export interface DistanceReading {
  parallaxMas: number | null;
  parallaxErrorMas: number | null;
  distancePc: number | null;
  distanceErrorPc: number | null;
}

const parallaxRule = {
  above: 0,
  expected: 'a parallax greater than 0 mas, or a distance in its place',
};
const agreementSigma = 5;
const agreementShare = 0.05;

/** Reads parallax and distance of one row; where both are given they must agree. */
export function readDistance(reading: TableReading, row: number): DistanceReading {
  const parallax = reading.number('parallax', row, parallaxRule);
  const parallaxError = reading.number('parallax_error', row, notNegative);
  const distance = reading.number('distance', row, positive);
  const distanceError = reading.number('distance_error', row, notNegative);
  const result = {
    parallaxMas: parallax ?? null,
    parallaxErrorMas: parallaxError ?? null,
    distancePc: distance ?? null,
    distanceErrorPc: distanceError ?? null,
  };
  if ([parallax, parallaxError, distance, distanceError].includes(refused)) return result;
  if (parallax === null && parallaxError !== null) {
    reading.missing('parallax', row, 'a parallax, as its error is given');
  }
  if (distance === null && distanceError !== null) {
    reading.missing('distance', row, 'a distance, as its error is given');
  }
  checkAgreement(reading, row, result);
  return result;
}

function checkAgreement(reading: TableReading, row: number, found: DistanceReading): void {
  const { parallaxMas, parallaxErrorMas, distancePc, distanceErrorPc } = found;
  if (parallaxMas === null || distancePc === null) return;
  const fromParallaxPc = distancePcFromParallax(parallaxMas);
  const errorPc = Math.hypot(
    distanceErrorPc ?? 0,
    (fromParallaxPc * (parallaxErrorMas ?? 0)) / parallaxMas,
  );
  const areBothStated = parallaxErrorMas !== null && distanceErrorPc !== null;
  const allowedPc = Math.max(
    agreementSigma * errorPc,
    areBothStated ? 0 : agreementShare * distancePc,
  );
  if (Math.abs(fromParallaxPc - distancePc) <= allowedPc) return;
  const computed = Number(fromParallaxPc.toPrecision(4));
  reading.fault(reading.place(row), {
    code: 'inconsistent',
    found: `distance ${distancePc} pc and parallax ${parallaxMas} mas (${computed} pc)`,
    expected: areBothStated
      ? `them to agree within ${agreementSigma} sigma, or one of them`
      : 'them to agree within 5 %, or one of them',
  });
}
