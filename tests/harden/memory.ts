import { readdirSync, readFileSync } from 'node:fs';

const EVERY_MS = 50;

const fieldsOf = (pid: string): string[] | null => {
  try {
    const text = readFileSync(`/proc/${pid}/stat`, 'utf8');
    return text.slice(text.lastIndexOf(')') + 2).split(' ');
  } catch {
    return null;
  }
};

/** Resident memory of a process in MiB; 0 where it has ended. */
function residentMb(pid: string): number {
  try {
    const found = /VmRSS:\s+(\d+) kB/.exec(readFileSync(`/proc/${pid}/status`, 'utf8'));
    return found ? Number(found[1]) / 1024 : 0;
  } catch {
    return 0;
  }
}

/** Processes of a group, which a service of the product leads. */
function groupOf(leader: number): string[] {
  return readdirSync('/proc')
    .filter((name) => /^\d+$/.test(name))
    .filter((pid) => Number(fieldsOf(pid)?.[2]) === leader);
}

export interface MemoryWatch {
  /** Resident memory when the watch began [MiB]. */
  startMb: number;
  /** @returns the most since then [MiB], over all processes of the group together */
  stop(): number;
}

/** Watches the resident memory of a service and of whatever it has started. */
export function watchMemory(leader: number): MemoryWatch {
  const now = () => groupOf(leader).reduce((sum, pid) => sum + residentMb(pid), 0);
  const startMb = now();
  let mostMb = startMb;
  const timer = setInterval(() => {
    mostMb = Math.max(mostMb, now());
  }, EVERY_MS);
  return {
    startMb: Math.round(startMb),
    stop: () => {
      clearInterval(timer);
      return Math.round(Math.max(mostMb, now()));
    },
  };
}
