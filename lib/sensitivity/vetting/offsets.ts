const DEGREE = Math.PI / 180;

/** A source's place from its star, as it was measured at one epoch. */
export interface MeasuredOffset {
  julianYear: number;
  /** [arcsec], > 0. */
  separationArcsec: number;
  /** 1 σ, [arcsec], > 0. */
  separationErrorArcsec: number;
  /** From north through east, [deg]. */
  positionAngleDeg: number;
  /** 1 σ, [deg], > 0. */
  positionAngleErrorDeg: number;
}

/** Towards east and towards north, [arcsec]. */
export interface Offset {
  eastArcsec: number;
  northArcsec: number;
}

/** Covariance of an offset, [arcsec²]. */
export interface OffsetCovariance {
  east: number;
  north: number;
  both: number;
}

/** Separation and position angle, the angle between 0 and 360. */
export interface PolarOffset {
  separationArcsec: number;
  positionAngleDeg: number;
}

/**
 * @param separationArcsec [arcsec]
 * @param positionAngleDeg from north through east, [deg]
 */
export function offsetOf({ separationArcsec, positionAngleDeg }: PolarOffset): Offset {
  const angle = positionAngleDeg * DEGREE;
  return {
    eastArcsec: separationArcsec * Math.sin(angle),
    northArcsec: separationArcsec * Math.cos(angle),
  };
}

/** The inverse of offsetOf. */
export function polarOf({ eastArcsec, northArcsec }: Offset): PolarOffset {
  const angle = Math.atan2(eastArcsec, northArcsec) / DEGREE;
  return {
    separationArcsec: Math.hypot(eastArcsec, northArcsec),
    positionAngleDeg: (angle + 360) % 360,
  };
}

/**
 * Covariance of a measured offset: the error of the separation along it, that of the angle across.
 *
 * @throws RangeError for a separation or an error that is not > 0
 */
export function covarianceOf(measured: MeasuredOffset): OffsetCovariance {
  const { separationArcsec, separationErrorArcsec, positionAngleErrorDeg } = measured;
  const positive = { separationArcsec, separationErrorArcsec, positionAngleErrorDeg };
  for (const [name, value] of Object.entries(positive)) {
    if (!(value > 0 && Number.isFinite(value))) {
      throw new RangeError(`${name} of an observation must be finite and > 0, got ${value}`);
    }
  }
  const along = separationErrorArcsec ** 2;
  const across = (separationArcsec * positionAngleErrorDeg * DEGREE) ** 2;
  const [sine, cosine] = [
    Math.sin(measured.positionAngleDeg * DEGREE),
    Math.cos(measured.positionAngleDeg * DEGREE),
  ];
  return {
    east: along * sine * sine + across * cosine * cosine,
    north: along * cosine * cosine + across * sine * sine,
    both: (along - across) * sine * cosine,
  };
}
