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

const debianPython = '/usr/bin/python3';

/**
 * A Python that has the modules. Debian's own comes first: another one on the path may not see
 * Debian's packages, so what is missing is what that one lacks, whatever the other has.
 */
async function findPython(/** @type {string[]} */ modules) {
  let missing = modules;
  for (const command of [debianPython, 'python3']) {
    const { code, stdout } = await run(command, ['-c', listMissing, ...modules]);
    if (code !== 0) continue;
    const lacking = stdout.trim().split(' ').filter(Boolean);
    if (lacking.length === 0) return { command, missing: [] };
    if (command === debianPython) missing = lacking;
  }
  return { command: null, missing };
}

/** @returns {Promise<string | null>} the command of a Python that has NumPy */
export async function findNumpy() {
  return (await findPython(['numpy'])).command;
}

const readerModules = ['numpy', 'astropy', 'pandas', 'h5py'];
/** Commands that look at exported files, each with the package that brings it. */
const readerCommands = [
  { command: 'fitsverify', name: 'fitsverify' },
  { command: 'xmllint', name: 'libxml2-utils' },
  { command: 'pdffonts', name: 'poppler-utils' },
];

const isThere = async (/** @type {string} */ command) =>
  (await run('sh', ['-c', `command -v ${command}`])).code === 0;

/**
 * The clients that read exported files. stilts, which brings 350 MB of Java, is asked where it is
 * and missed nowhere.
 *
 * @returns {Promise<{ python: string | null, hasStilts: boolean, missing: FoundPrograms['missing'] }>}
 */
export async function findExportReaders() {
  const python = await findPython(readerModules);
  /** @type {FoundPrograms['missing']} */
  const missing = [];
  if (python.command === null) {
    const packages = python.missing.map((name) => `python3-${name}`);
    missing.push({ program: 'Astropy, pandas and h5py', packages });
  }
  for (const { command, name } of readerCommands) {
    if (!(await isThere(command))) missing.push({ program: command, packages: [name] });
  }
  const hasStilts = await isThere('stilts');
  return { python: python.command, hasStilts, missing };
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
