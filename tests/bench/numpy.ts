import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { decodeMap } from '@/lib/sensitivity';
import type { Amount } from './amount';
import { engineMap, warmUpEngine } from './maps';
import { readNpy } from './npy';
import { MonteCarloProcess, monteCarloScript, numpyCommand, runToEnd } from './numpy-process';
import { mapErrors, referenceMap } from './reference';
import type { Errors, Line, Target } from './report';
import { compareTimed, millisecondsOf } from './rounds';
import { inventStars, inventSurvey } from './survey';
import { writeSurvey } from './survey-file';

const YARDSTICK_STARS = 4;
const COLD_STARS = 78;

const WARM: Target[] = [
  { of: 'ratio', bound: 'at least', must: 250 },
  { of: 'RMS', bound: 'at most', must: 2e-4 },
  { of: 'max', bound: 'at most', must: 5e-3 },
  { of: 'mean', bound: 'at most', must: 5e-5 },
];
const COLD: Target[] = [{ of: 'ratio', bound: 'at least', must: 12 }];

/** Maps of a file, in pieces of one star. */
function mapsOfFile(file: string): Float64Array[] {
  const { shape, values } = readNpy(readFileSync(file));
  const size = shape[1] * shape[2];
  return Array.from({ length: shape[0] }, (_, star) =>
    Float64Array.from(values.subarray(star * size, (star + 1) * size)),
  );
}

async function warmLines(command: string, folder: string, amount: Amount): Promise<Line[]> {
  const surveyFile = path.join(folder, 'few.json');
  const mapsFile = path.join(folder, 'few.npy');
  writeFileSync(surveyFile, writeSurvey(inventSurvey(YARDSTICK_STARS, 'smooth')));
  await runToEnd(command, [monteCarloScript(), '--survey', surveyFile, '--maps-out', mapsFile]);
  const few = inventStars(YARDSTICK_STARS);
  const references = few.map((star) => referenceMap(star, 'smooth', amount.resolution.smooth));
  const plain = mapErrors(mapsOfFile(mapsFile), references);
  const errors: Errors = mapErrors(
    few.map((star) => decodeMap(engineMap(star, 'smooth'))),
    references,
  );
  const numpy = new MonteCarloProcess(command, surveyFile);
  try {
    await numpy.start();
    await numpy.measure(0, YARDSTICK_STARS);
    const after = warmUpEngine('smooth');
    const lines: Line[] = [];
    for (const stars of amount.smoothMaps.filter((count) => count >= COLD_STARS)) {
      const sample = inventStars(stars);
      const run = () => sample.reduce((sum, star) => sum + engineMap(star, 'smooth')[0], 0);
      const compared = await compareTimed(
        async () => millisecondsOf({ run }),
        () => numpy.measure(0, YARDSTICK_STARS),
        amount.rounds,
        stars / YARDSTICK_STARS,
      );
      lines.push({
        name: 'maps, smooth, warm, beside NumPy',
        stars,
        rounds: compared.rounds,
        medianMs: compared.medianMs,
        ratio: compared.ratio,
        unit: 'times',
        yardstick: `NumPy ${numpy.version} Monte Carlo, 10^4 draws (RMS ${plain.RMS.toExponential(1)}), after ${after} stars`,
        errors,
        targets: WARM,
      });
    }
    return lines;
  } finally {
    await numpy.end();
  }
}

/** From the survey's JSON to its maps in a file, each a process of its own, its start included. */
async function coldLine(command: string, folder: string, { rounds }: Amount): Promise<Line> {
  const surveyFile = path.join(folder, 'survey.json');
  const to = (name: string) => path.join(folder, name);
  writeFileSync(surveyFile, writeSurvey(inventSurvey(COLD_STARS, 'smooth')));
  const ownScript = path.join(path.dirname(process.argv[1]), 'survey-maps.js');
  const timed = async (program: string, script: string, out: string) => {
    const words = [script, '--survey', surveyFile, '--maps-out', out, '--time'];
    return Number(await runToEnd(program, words));
  };
  const compared = await compareTimed(
    () => timed(process.execPath, ownScript, to('own.npy')),
    () => timed(command, monteCarloScript(), to('plain.npy')),
    rounds,
  );
  const [own, plain] = [mapsOfFile(to('own.npy')), mapsOfFile(to('plain.npy'))];
  const { RMS } = mapErrors(own, plain);
  return {
    name: 'maps, smooth, whole process',
    stars: COLD_STARS,
    rounds: compared.rounds,
    medianMs: compared.medianMs,
    ratio: compared.ratio,
    unit: 'times',
    yardstick: `NumPy process from the same file (the two differ by RMS ${RMS.toExponential(1)})`,
    errors: {},
    targets: COLD,
  };
}

/** Maps against a plain Monte Carlo in NumPy, on the same survey files; none where it is missing. */
export async function numpyLines(amount: Amount): Promise<Line[]> {
  const command = numpyCommand();
  if (command === null) return [];
  const folder = mkdtempSync(path.join(tmpdir(), 'bench-maps-'));
  try {
    return [...(await warmLines(command, folder, amount)), await coldLine(command, folder, amount)];
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}
