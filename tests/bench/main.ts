import { cpus } from 'node:os';
import { parseArgs } from 'node:util';
import { ENGINE_VERSION } from '@/lib/sensitivity';
import project from '@/package.json';
import { type Amount, FULL, QUICK } from './amount';
import { calibrationLines } from './calibration';
import { GRID, GRIDS } from './grid';
import { liveLines } from './live';
import { mapLines } from './maps';
import { numpyLines } from './numpy';
import { numpyCommand } from './numpy-process';
import { posteriorLines } from './posterior';
import { type Line, linesWithVerdicts, printTable } from './report';
import { keptSum } from './rounds';
import { SEED } from './survey';
import { wireLines } from './wire';

type Group = (amount: Amount) => Line[] | Promise<Line[]>;

/** Maps come first: their first pass has to be the first of the process. */
const groups: Record<string, Group> = {
  maps: async (amount) => [...mapLines(amount), ...(await numpyLines(amount))],
  posterior: posteriorLines,
  live: liveLines,
  calibration: calibrationLines,
  // Loaded when it is asked for: the others need no database.
  storage: async (amount) => (await import('./storage')).storageLines(amount),
  wire: wireLines,
};

const NOTES = [
  'Times: processor time, of the process that did the work; of storage the clock on the wall.',
  'Ratio: yardstick over product, round by round, median (min to max); for live the share of a',
  'frame, for wire the bytes, for storage product over yardstick.',
  'Errors of maps: four stars against a reference of this run with many ages and distances, summed',
  'over separation; mean is the mean completeness under the population. Limit: relative error.',
  'Error of storage: the largest difference of the two sums.',
  'Targets of all maps: those of a grid of 100 by 100 coded as differences of neighbours.',
  'A run sends all its maps as uint16, without compression; no address sends the mean map alone.',
  'A run reads its maps by a binary copy, one at a time; plain rows come as hex text, some at once.',
];

const YARDSTICK_NOTE = () =>
  numpyCommand() === null
    ? 'NumPy is not installed (python3-numpy): maps are held against the Monte Carlo in this process.'
    : 'Maps are held against the Monte Carlo in this process and against one in NumPy beside it.';

const USAGE = `Usage: npm run bench -- [--quick] [--json] [--grid 100] [--only ${Object.keys(groups).join('|')}]`;

function readArguments() {
  const { values } = parseArgs({
    options: {
      quick: { type: 'boolean', default: false },
      json: { type: 'boolean', default: false },
      only: { type: 'string', multiple: true },
      grid: { type: 'string', default: 'own' },
    },
  });
  const unknown = values.only?.find((name) => !(name in groups));
  if (unknown !== undefined) throw new TypeError(`there is no part named ${unknown}`);
  if (!(values.grid in GRIDS)) throw new TypeError(`there is no grid named ${values.grid}`);
  return { ...values, only: values.only ?? Object.keys(groups) };
}

function describeMachine() {
  const [first] = cpus();
  const { node, v8 } = process.versions;
  return {
    rarebound: project.version,
    engine: ENGINE_VERSION,
    node,
    v8,
    system: `${process.platform} ${process.arch}`,
    grid: `${GRID.massMjup.length} × ${GRID.semiMajorAxisAu.length}`,
    processors: `${cpus().length} × ${first?.model ?? 'unknown'}`,
  };
}

async function measure({ quick, json, only }: ReturnType<typeof readArguments>): Promise<void> {
  const amount = quick ? QUICK : FULL;
  const start = performance.now();
  const lines: Line[] = [];
  for (const name of Object.keys(groups).filter((group) => only.includes(group))) {
    process.stderr.write(`Measuring ${name}…\n`);
    lines.push(...(await groups[name](amount)));
  }
  const seconds = Math.round((performance.now() - start) / 1000);
  const versions = describeMachine();
  if (json) {
    const { rounds } = amount;
    const seeds = { survey: SEED };
    const report = { versions, seeds, rounds, quick, seconds, lines: linesWithVerdicts(lines) };
    process.stdout.write(`${JSON.stringify(report, null, 2)}\n`);
  } else {
    const about = Object.entries(versions).map(([what, version]) => `${what} ${version}`);
    process.stdout.write(
      `${printTable(lines)}\n\n${[...NOTES, YARDSTICK_NOTE()].join('\n')}\n\n` +
        `${about.join(', ')}; seed '${SEED}'; ${amount.rounds} rounds; ${seconds} s\n`,
    );
  }
  if (!Number.isFinite(keptSum())) throw new RangeError('a measured result is not a number');
}

let chosen: ReturnType<typeof readArguments> | null = null;
try {
  chosen = readArguments();
} catch (reason) {
  if (!(reason instanceof TypeError)) throw reason;
  process.stderr.write(`${reason.message}\n${USAGE}\n`);
  process.exitCode = 2;
}
if (chosen) {
  measure(chosen).catch((reason) => {
    process.stderr.write(`${reason.stack}\n`);
    process.exitCode = 1;
  });
}
