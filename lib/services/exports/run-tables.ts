import { levelColumns, tableOfRows, type WrittenTable } from '@/lib/formats';
import { type FinishedRun, limitsTable, posteriorTable } from '../export-limits';
import { populationsTable } from './population-rows';
import { runProvenance } from './provenance';
import type { LatexColumns } from './table-formats';
import { usedCompanionsTable, usedTargetsTable } from './used-rows';

type Head = Pick<WrittenTable, 'provenance'>;

interface RunTable {
  /** What is in it, for people. */
  what: string;
  latex: LatexColumns;
  build(run: FinishedRun, head: Head): WrittenTable | Promise<WrittenTable>;
}

function levelsTable(run: FinishedRun, head: Head): WrittenTable {
  const rows = run.result.levels.map((row) => ({
    credible_level: row.level,
    host_fraction: row.hostFraction,
    companions_per_star: row.meanNumber,
    host_fraction_zero: row.hostFractionZero,
    companions_per_star_zero: row.meanNumberZero,
  }));
  const title = `Upper limits by level of ${run.analysis}, run ${run.number}`;
  return tableOfRows({ name: 'levels', title, ...head }, levelColumns, rows);
}

function populationTable(run: FinishedRun, head: Head): WrittenTable {
  return populationsTable({ title: `Population of ${run.analysis}, run ${run.number}`, ...head }, [
    { ...run.inputs.population, definition: run.population },
  ]);
}

/** The tables of a run, by the stem of their files. */
export const runTables: Readonly<Record<string, RunTable>> = {
  limits: {
    what: 'Limits and intervals, with and without detections',
    latex: { columns: ['quantity', 'interval', 'credible_level', 'lower', 'estimate', 'upper'] },
    build: limitsTable,
  },
  levels: {
    what: 'Upper limits by credible level',
    latex: { columns: levelColumns.map(({ name }) => name) },
    build: levelsTable,
  },
  posterior: {
    what: 'Posterior of the rate on a grid',
    latex: { columns: ['value', 'density', 'cumulative'] },
    build: posteriorTable,
  },
  targets: {
    what: 'Targets, with whether and why each was used',
    latex: {
      columns: ['name', 'survey', 'spectral_type', 'distance', 'age', 'mass', 'used', 'reason'],
    },
    build: usedTargetsTable,
  },
  companions: {
    what: 'Companions and candidates, with how each counts',
    latex: {
      columns: [
        'target',
        'companion',
        'status',
        'mass',
        'semi_major_axis',
        'probability',
        'used',
        'reason',
      ],
    },
    build: usedCompanionsTable,
  },
  populations: {
    what: 'Population with its laws and indices',
    latex: {
      columns: [
        'population',
        'version',
        'mass_min',
        'mass_max',
        'semi_major_axis_min',
        'semi_major_axis_max',
        'mass_index_linear',
        'semi_major_axis_index_linear',
      ],
    },
    build: populationTable,
  },
};

/** One table of a run with all that its files say beside the numbers. */
export async function tableOfRun(run: FinishedRun, name: string): Promise<WrittenTable> {
  return runTables[name].build(run, { provenance: runProvenance(run) });
}
