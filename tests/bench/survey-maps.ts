import { readFileSync, writeFileSync } from 'node:fs';
import { parseArgs } from 'node:util';
import { computeCompletenessMap } from '@/lib/sensitivity';
import { writeNpy } from './npy';
import { inventSurvey } from './survey';
import { readSurvey, type Survey, writeSurvey } from './survey-file';

const USAGE =
  'Usage: npm run bench -- --survey FILE --maps-out FILE [--time]\n' +
  '       npm run bench -- --survey-out FILE [--stars N] [--threshold smooth|hard] [--grid 100]';

function* mapsOf({ stars, cooling, grid, settings }: Survey): Iterable<Float64Array> {
  for (const star of stars) {
    yield computeCompletenessMap(star, cooling, grid, settings).map.completeness;
  }
}

/** Since this process began. */
function processorMilliseconds(): number {
  const { user, system } = process.cpuUsage();
  return (user + system) / 1000;
}

/** Writes the maps of a survey file, [star, mass, semi-major axis], or an invented survey. */
function main(): void {
  const { values } = parseArgs({
    options: {
      survey: { type: 'string' },
      'maps-out': { type: 'string' },
      'survey-out': { type: 'string' },
      stars: { type: 'string', default: '78' },
      threshold: { type: 'string', default: 'smooth' },
      grid: { type: 'string' },
      time: { type: 'boolean', default: false },
    },
  });
  const { survey: from, 'maps-out': to, 'survey-out': invented } = values;
  if (invented !== undefined && from === undefined) {
    const threshold = values.threshold === 'hard' ? 'hard' : 'smooth';
    writeFileSync(invented, writeSurvey(inventSurvey(Number(values.stars), threshold)));
    return;
  }
  if (from === undefined || to === undefined)
    throw new TypeError('a file to read and one to write');
  const survey = readSurvey(readFileSync(from, 'utf8'));
  const { massMjup, semiMajorAxisAu } = survey.grid;
  writeNpy(to, [survey.stars.length, massMjup.length, semiMajorAxisAu.length], mapsOf(survey));
  if (values.time) process.stdout.write(`${processorMilliseconds()}\n`);
}

try {
  main();
} catch (reason) {
  if (!(reason instanceof Error)) throw reason;
  process.stderr.write(`${reason.message}\n${USAGE}\n`);
  process.exitCode = 2;
}
