import path from 'node:path';
import { closeReaders, readOnThread } from '@/lib/services/reading';
import { readMutations, type Tally } from '../mutation-run';
import type { Bench, Measured, Row } from '../row';
import { loadFormats } from '../sample-files';

const LONGEST_MS = 5000;
const perFormat = () => Number(process.env.HARDEN_MUTATIONS ?? 2000);

async function measure({ root, say }: Bench): Promise<Measured> {
  const formats = await loadFormats(path.join(root, 'tests/fixtures'));
  const tallies: Record<string, Tally> = {};
  try {
    for (const format of formats) {
      const tally = await readMutations(format, perFormat(), LONGEST_MS, (bytes, context) =>
        readOnThread({ byteLength: bytes.length, load: async () => bytes.slice() }, context),
      );
      tallies[format.name] = tally;
      const { accepted, refused, slowestMs, findings } = tally;
      const slowest = `slowest ${Math.round(slowestMs)} ms`;
      say(
        `${format.name}: ${accepted} read, ${refused} refused, ${findings.length} wrong, ${slowest}`,
      );
    }
  } finally {
    await closeReaders();
  }
  const all = Object.values(tallies);
  const findings = all.flatMap((tally) => tally.findings);
  const slowestMs = Math.round(Math.max(...all.map((tally) => tally.slowestMs)));
  const mutations = all.reduce((sum, tally) => sum + tally.mutations, 0);
  return {
    isMet: findings.length === 0,
    figure: `${mutations} files of ${all.length} formats, ${findings.length} wrong answers, slowest ${slowestMs} ms`,
    details: Object.fromEntries(
      Object.entries(tallies).map(([name, { findings: found, ...tally }]) => [
        name,
        { ...tally, slowestMs: Math.round(tally.slowestMs), wrong: found.length },
      ]),
    ),
    notes: findings.slice(0, 20).map(({ mutation, what }) => `${mutation}: ${what}`),
  };
}

export const row: Row = {
  name: 'damaged-files',
  what: 'I3: flipped, cut and spliced copies of every sample, on the thread that reads uploads',
  goal: 'each answered within 5 s; no crash; no value outside its domain',
  measure,
};
