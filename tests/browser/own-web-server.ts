import { type ChildProcess, spawn } from 'node:child_process';
import { once } from 'node:events';
import { createServer } from 'node:net';

const PATIENCE_MS = 60_000;

/** How the launcher starts the web server: its last argument, the port, is missing. */
interface Recipe {
  command: string;
  args: string[];
  env: NodeJS.ProcessEnv;
}

/** Asks the system for a port that nobody uses. */
async function freePort(): Promise<number> {
  const server = createServer().listen(0, '127.0.0.1');
  await once(server, 'listening');
  const address = server.address();
  server.close();
  await once(server, 'close');
  if (address === null || typeof address === 'string') throw new Error('no port was given');
  return address.port;
}

/** A web server of the test's own beside the product's, on the same database and data folder. */
export class OwnWebServer {
  private child: ChildProcess | undefined;

  private constructor(
    private readonly recipe: Recipe,
    private readonly port: number,
  ) {}

  static async start(): Promise<OwnWebServer> {
    const recipe = process.env.WEB_SERVER;
    if (!recipe) throw new Error('WEB_SERVER is not set; run with: npm test -- browser');
    const server = new OwnWebServer(JSON.parse(recipe) as Recipe, await freePort());
    await server.begin();
    return server;
  }

  get address(): string {
    return `http://127.0.0.1:${this.port}`;
  }

  /** Starts it, again after an end, and waits until it answers. */
  async begin(): Promise<void> {
    const { command, args, env } = this.recipe;
    this.child = spawn(command, [...args, String(this.port)], {
      env: { ...env, NEXTAUTH_URL: this.address },
      stdio: 'ignore',
      detached: true,
    });
    const end = Date.now() + PATIENCE_MS;
    while (!(await this.isUp())) {
      if (Date.now() > end) throw new Error('the web server of the test did not start');
      await new Promise((resolve) => setTimeout(resolve, 100));
    }
  }

  async isUp(): Promise<boolean> {
    try {
      return (await fetch(`${this.address}/api/health`)).ok;
    } catch {
      return false;
    }
  }

  /** Sends the signal to all its processes. @returns what it ended with, once it has ended */
  async end(signal: 'SIGKILL' | 'SIGTERM'): Promise<number | null> {
    const { child } = this;
    if (child?.pid === undefined || child.exitCode !== null) return child?.exitCode ?? null;
    const ended = once(child, 'exit');
    process.kill(signal === 'SIGKILL' ? -child.pid : child.pid, signal);
    const [code] = (await ended) as [number | null];
    return code;
  }
}
