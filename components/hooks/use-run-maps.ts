'use client';

import useSWR from 'swr';
import type { DrawnRun } from '@/lib/schemas/runs';
import { apiPath } from './api-path';
import { ApiProblem } from './api-problem';
import { requestBytes } from './request';

/** The maps of all stars of a run on its common grid. */
export interface StarMaps {
  massMjup: Float64Array;
  semiMajorAxisAu: Float64Array;
  stars: number;
  /** Shape [star, mass, semi-major axis], row-major: completeness times 65535, as stored. */
  values: Uint16Array;
}

/** Fetched once a run: its maps can never change. */
export function useRunMaps(collaboration: string, run: DrawnRun | undefined) {
  const inputs = run?.inputs ?? undefined;
  return useSWR<StarMaps>(
    run === undefined || !inputs ? null : apiPath(collaboration, 'runs', run.id, 'maps'),
    async (path: string) => {
      if (!inputs) throw new Error('a run without inputs has no maps');
      const bytes = await requestBytes(path);
      return readStarMaps(bytes, inputs.grid, inputs.stars.length);
    },
    { revalidateIfStale: false, revalidateOnFocus: false, revalidateOnReconnect: false },
  );
}

/**
 * @param bytes unsigned 16-bit little-endian values, shape [star, mass, semi-major axis]
 * @throws ApiProblem for a length that does not fit the run's grid and stars
 */
export function readStarMaps(
  bytes: ArrayBuffer,
  grid: { massMjup: number[]; semiMajorAxisAu: number[] },
  stars: number,
): StarMaps {
  const expected = 2 * stars * grid.massMjup.length * grid.semiMajorAxisAu.length;
  if (bytes.byteLength !== expected) {
    throw new ApiProblem({
      type: 'about:blank',
      title: 'Incomplete maps',
      status: 200,
      code: 'incomplete-maps',
      detail: `The maps arrived with ${bytes.byteLength} bytes, expected ${expected}. Reload the page to fetch them again.`,
    });
  }
  return {
    massMjup: Float64Array.from(grid.massMjup),
    semiMajorAxisAu: Float64Array.from(grid.semiMajorAxisAu),
    stars,
    values: littleEndian(bytes),
  };
}

/** The bytes themselves where the machine has the order of the wire, as nearly all have. */
function littleEndian(bytes: ArrayBuffer): Uint16Array {
  const values = new Uint16Array(bytes);
  if (new Uint8Array(Uint16Array.of(1).buffer)[0] === 1) return values;
  return values.map((value) => (value >> 8) | ((value & 0xff) << 8));
}
