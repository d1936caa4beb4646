import type { Kernels } from './kernels';
import { reserve } from './machine';
import * as steps from './steps';

/** The kernels in plain TypeScript, for machines without WebAssembly SIMD. */
export const plainKernels: Kernels = { ...steps, name: 'plain', reserve };
