import net from 'node:net';
import { wait } from './process-run.mjs';

/**
 * A lock that the kernel frees when its holder dies: an abstract Unix socket, so no file is left
 * behind by a kill -9 and no number of a dead process has to be judged.
 *
 * @param {string} name
 * @param {() => string} introduce what to tell somebody who finds the lock taken
 * @returns {Promise<{ release: () => Promise<void> } | { heldBy: string }>}
 */
export async function holdExclusively(name, introduce = () => '') {
  const address = `\0rarebound-${name}`;
  const server = net.createServer((socket) => {
    socket.on('error', () => {});
    socket.end(introduce());
  });
  const problem = await new Promise((resolve) => {
    server.once('error', resolve);
    server.listen(address, () => resolve(null));
  });
  if (problem === null) {
    server.unref();
    return { release: () => new Promise((resolve) => server.close(() => resolve())) };
  }
  if (problem.code !== 'EADDRINUSE') throw problem;
  const answer = await askHolder(name);
  return answer === null ? holdExclusively(name, introduce) : { heldBy: answer };
}

/** @returns {Promise<string | null>} the holder's words, null when nobody holds the lock */
export function askHolder(/** @type {string} */ name) {
  return new Promise((resolve) => {
    let words = '';
    const socket = net.connect(`\0rarebound-${name}`);
    socket.setTimeout(2000, () => socket.destroy());
    socket.on('data', (chunk) => {
      words += chunk;
    });
    socket.on('error', () => resolve(null));
    socket.on('close', () => resolve(words));
  });
}

/** Holds the lock while the work is done, after waiting for whoever has it. */
export async function withExclusive(
  /** @type {string} */ name,
  /** @type {() => Promise<any>} */ work,
) {
  for (;;) {
    const lock = await holdExclusively(name);
    if ('release' in lock) {
      try {
        return await work();
      } finally {
        await lock.release();
      }
    }
    await wait(100);
  }
}
