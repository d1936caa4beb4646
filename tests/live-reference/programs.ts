import path from 'node:path';
import { run } from '@/lib/local/process-run.mjs';
import type { FoundPrograms } from '@/lib/local/reference-programs.mjs';
import type { LiveCheck, Program } from './check';

/** What a program says of one row: numbers, and their standard errors where it drew them. */
export interface ProgramAnswer {
  value: number[];
  standardError?: number[];
}

const scriptOf = { R: 'reference.R', SciPy: 'reference.py' } as const;

async function askProgram(program: Program, command: string, input: string): Promise<string> {
  const script = path.join(import.meta.dirname, scriptOf[program]);
  // Python would else leave its compiled modules beside the scripts.
  const env = { ...process.env, PYTHONDONTWRITEBYTECODE: '1' };
  const { code, output, stdout } = await run(command, [script], { input, env });
  if (code !== 0) throw new Error(`${program} ended with exit code ${code}:\n${output}`);
  return stdout;
}

async function askR(command: string, checks: LiveCheck[]): Promise<ProgramAnswer[][]> {
  const lines = checks.flatMap(({ what, rows }) =>
    rows.map((row) => [what, ...(row as number[])].join(' ')),
  );
  const answer = await askProgram('R', command, `${lines.join('\n')}\n`);
  const values = answer.trim().split('\n');
  if (values.length !== lines.length) {
    throw new Error(`R answered ${values.length} of ${lines.length} questions`);
  }
  let next = 0;
  return checks.map(({ rows }) =>
    rows.map(() => ({ value: values[next++].trim().split(/\s+/).map(Number) })),
  );
}

async function askSciPy(command: string, checks: LiveCheck[]): Promise<ProgramAnswer[][]> {
  const questions = checks.map(({ what, rows }) => ({ what, rows }));
  return JSON.parse(await askProgram('SciPy', command, JSON.stringify(questions)));
}

/**
 * Asks every check of its program, all of one program in one process.
 *
 * @returns answers by check and row; checks of programs that are missing are not in it
 */
export async function askPrograms(
  found: FoundPrograms,
  checks: LiveCheck[],
): Promise<Map<LiveCheck, ProgramAnswer[]>> {
  const of = (program: Program) => checks.filter((check) => check.program === program);
  const asked = await Promise.all([
    found.R === null ? [] : askR(found.R, of('R')),
    found.SciPy === null ? [] : askSciPy(found.SciPy, of('SciPy')),
  ]);
  const answers = new Map<LiveCheck, ProgramAnswer[]>();
  (['R', 'SciPy'] as const).forEach((program, i) => {
    asked[i].forEach((answer, k) => {
      answers.set(of(program)[k], answer);
    });
  });
  return answers;
}
