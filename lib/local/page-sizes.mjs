import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { gzipSync } from 'node:zlib';
import { root } from './environment.mjs';

/** Compressed JavaScript that one screen may load before anything on it is touched. */
export const MOST_BYTES = 200_000;

const MANIFEST = 'page_client-reference-manifest.js';

/** @typedef {{ page: string, bytes: number, files: { file: string, bytes: number }[] }} PageSize */

/** The manifest is a script that assigns one object to the page's name. */
function readManifest(/** @type {string} */ file) {
  const text = readFileSync(file, 'utf8');
  const start = text.indexOf('] = ');
  if (start < 0) throw new Error(`${file} is not the manifest of a page that this script knows`);
  return JSON.parse(text.slice(start + 4).replace(/;\s*$/, ''));
}

/**
 * What each page of a build loads first: the scripts of the framework and of every layout, boundary
 * and page on its way, each file compressed as the server does. Parts that are asked for later
 * (dynamic imports) do not count.
 *
 * @param {string} folder of the build, below the root of the project
 * @returns {PageSize[]} the largest first
 */
export function measurePages(folder) {
  const build = path.join(root, folder);
  const { rootMainFiles } = JSON.parse(
    readFileSync(path.join(build, 'build-manifest.json'), 'utf8'),
  );
  /** @type {Map<string, number>} */
  const sizes = new Map();
  const sizeOf = (/** @type {string} */ file) => {
    const known = sizes.get(file);
    if (known !== undefined) return known;
    const bytes = gzipSync(readFileSync(path.join(build, file))).length;
    sizes.set(file, bytes);
    return bytes;
  };
  const app = path.join(build, 'server/app');
  const manifests = readdirSync(app, { recursive: true, encoding: 'utf8' }).filter(
    (file) => path.basename(file) === MANIFEST,
  );
  if (manifests.length === 0) throw new Error(`There is no page in ${folder}`);
  return manifests
    .map((file) => {
      const { entryJSFiles } = readManifest(path.join(app, file));
      const names = new Set([...rootMainFiles, ...Object.values(entryJSFiles).flat()]);
      const files = [...names]
        .map((name) => ({ file: name, bytes: sizeOf(name) }))
        .sort((a, b) => b.bytes - a.bytes);
      const address = `/${path.dirname(file)}`.replaceAll(/\/\([a-z]+\)|\/\.$/g, '') || '/';
      return { page: address, bytes: files.reduce((sum, { bytes }) => sum + bytes, 0), files };
    })
    .sort((a, b) => b.bytes - a.bytes);
}

/** "187.3 kB  /[collaboration]/analyses/[analysis]" */
const sizeLine = (/** @type {PageSize} */ { page, bytes }) =>
  `${(bytes / 1000).toFixed(1).padStart(6)} kB  ${page}`;

/**
 * @param {PageSize[]} pages
 * @returns {import('./test-counts.mjs').Count} a build without pages, and each page that is too large, has failed
 */
export function countPages(pages) {
  const large = pages.filter(({ bytes }) => bytes > MOST_BYTES);
  const head = `Compressed JavaScript of the first load; ${large.length} of ${pages.length} pages above ${MOST_BYTES / 1000} kB`;
  return {
    passed: pages.length - large.length,
    failed: pages.length === 0 ? 1 : large.length,
    notes: [[`${head}:`, ...pages.map(sizeLine)].join('\n')],
  };
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  const [folder = '.next', ...options] = process.argv.slice(2);
  const pages = measurePages(folder);
  for (const page of pages) {
    process.stdout.write(`${sizeLine(page)}\n`);
    if (!options.includes('--files')) continue;
    for (const { file, bytes } of page.files) process.stdout.write(`        ${bytes}  ${file}\n`);
  }
  const { failed, notes } = countPages(pages);
  process.stdout.write(`${notes[0].split('\n')[0]}\n`);
  process.exitCode = failed > 0 ? 1 : 0;
}
