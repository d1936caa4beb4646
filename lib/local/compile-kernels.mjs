import { readdir, readFile, writeFile } from 'node:fs/promises';
import path from 'node:path';
import asc from 'assemblyscript/asc';
import { LauncherProblem, root, runCommand } from './environment.mjs';

const folder = path.join(root, 'lib/sensitivity/kernels');
const steps = path.join(folder, 'steps');
const source = 'steps/index.ts';
const target = path.join(folder, 'compiled-bytes.ts');
const LINE = 88;

/**
 * The module as the compiler writes it: the steps on the machine of pairs of doubles, no runtime, one
 * memory that is handed in.
 */
async function compile() {
  const messages = [];
  const machine = await readFile(path.join(folder, 'assembly/machine.ts'), 'utf8');
  const files = new Map([['machine.ts', machine]]);
  for (const name of await readdir(steps)) {
    files.set(`steps/${name}`, await readFile(path.join(steps, name), 'utf8'));
  }
  let bytes = null;
  const words = [source, '--outFile', 'kernels.wasm', '--runtime', 'stub', '--enable', 'simd'];
  const { error } = await asc.main([...words, '-O3', '--noAssert', '--importMemory'], {
    readFile: (name) => files.get(name) ?? null,
    writeFile: (_, contents) => {
      bytes = contents;
    },
    listFiles: () => [],
    stderr: {
      write: (text) => {
        messages.push(String(text));
        return true;
      },
    },
  });
  if (error || bytes === null) {
    throw new LauncherProblem(`The kernels do not compile:\n${messages.join('')}`);
  }
  return Buffer.from(bytes).toString('base64');
}

function moduleOf(base64) {
  const lines = base64.match(new RegExp(`.{1,${LINE}}`, 'g')).map((line) => `  '${line}',`);
  return [
    '/** Written by `npm run kernels` from the steps: a WebAssembly module, base64. */',
    'export const COMPILED_KERNELS: string = [',
    ...lines,
    "].join('');",
    '',
  ].join('\n');
}

runCommand(async () => {
  const text = moduleOf(await compile());
  if (process.argv.includes('--print')) process.stdout.write(text);
  else await writeFile(target, text);
  return 0;
});
