import { run } from './process-run.mjs';

const pythonModules = ['numpy', 'scipy', 'astropy'];
const listMissing =
  'import importlib.util, sys; ' +
  'print(*[name for name in sys.argv[1:] if importlib.util.find_spec(name) is None])';

/**
 * @typedef {object} FoundPrograms
 * @property {string | null} R the command that runs an R script
 * @property {string | null} SciPy the command of a Python that has NumPy, SciPy and Astropy
 * @property {{ program: 'R' | 'SciPy', packages: string[] }[]} missing with the Debian packages that
 *   would bring what is not there
 */

/** Debian's own Python comes first: another one on the path may not see Debian's packages. */
async function findPython(/** @type {string[]} */ modules) {
  let fewest = modules;
  for (const command of ['/usr/bin/python3', 'python3']) {
    const { code, stdout } = await run(command, ['-c', listMissing, ...modules]);
    if (code !== 0) continue;
    const missing = stdout.trim().split(' ').filter(Boolean);
    if (missing.length === 0) return { command, missing };
    if (missing.length < fewest.length) fewest = missing;
  }
  return { command: null, missing: fewest };
}

/** @returns {Promise<string | null>} the command of a Python that has NumPy */
export async function findNumpy() {
  return (await findPython(['numpy'])).command;
}

/** @returns {Promise<FoundPrograms>} the programs that the live references are asked of */
export async function findReferencePrograms() {
  const hasR = (await run('Rscript', ['--version'])).code === 0;
  const python = await findPython(pythonModules);
  /** @type {FoundPrograms['missing']} */
  const missing = [];
  if (!hasR) missing.push({ program: 'R', packages: ['r-base-core'] });
  if (python.command === null) {
    const packages = python.missing.map((name) => `python3-${name}`);
    missing.push({ program: 'SciPy', packages });
  }
  return { R: hasR ? 'Rscript' : null, SciPy: python.command, missing };
}
