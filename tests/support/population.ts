import type { PowerLawDefinition } from '@/lib/schemas/populations';

export const POPULATION: PowerLawDefinition = {
  form: 'power-law',
  massMinMjup: 3,
  massMaxMjup: 40,
  semiMajorAxisMinAu: 10,
  semiMajorAxisMaxAu: 200,
  massIndex: -0.31,
  semiMajorAxisIndex: 0.39,
};
