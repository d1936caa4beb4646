import net from 'node:net';
import { LauncherProblem } from './environment.mjs';

const tries = 50;

/** @returns {Promise<boolean>} whether nobody listens on this port of the loopback interface */
export function isPortFree(/** @type {number} */ port) {
  return new Promise((resolve) => {
    const server = net.createServer();
    server.once('error', () => resolve(false));
    server.listen({ port, host: '127.0.0.1', exclusive: true }, () =>
      server.close(() => resolve(true)),
    );
  });
}

/**
 * The wanted port, or the next free one above it.
 *
 * @param {number} wanted
 * @param {number[]} [taken] ports that this start has already given away
 * @returns {Promise<number>}
 */
export async function findFreePort(wanted, taken = []) {
  for (let port = wanted; port < Math.min(wanted + tries, 65536); port += 1) {
    if (!taken.includes(port) && (await isPortFree(port))) return port;
  }
  const last = Math.min(wanted + tries - 1, 65535);
  throw new LauncherProblem(
    `Every port from ${wanted} to ${last} is in use; set PORT to a free one.`,
  );
}

/** A port that the system picks, for a server whose number nobody needs to remember. */
export function findAnyPort() {
  return new Promise((resolve, reject) => {
    const server = net.createServer();
    server.once('error', reject);
    server.listen({ port: 0, host: '127.0.0.1' }, () => {
      const { port } = /** @type {net.AddressInfo} */ (server.address());
      server.close(() => resolve(port));
    });
  });
}

/** @returns {number} the port that the person asked for, 3210 when none was named */
export function wantedPort(/** @type {string | undefined} */ text) {
  if (text === undefined || text === '') return 3210;
  const port = Number(text);
  if (!Number.isInteger(port) || port < 1 || port > 65535) {
    throw new LauncherProblem(`PORT must be a whole number from 1 to 65535, got "${text}".`);
  }
  return port;
}
