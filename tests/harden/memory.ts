import { readdirSync, readFileSync, readlinkSync } from 'node:fs';

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

/** Resident memory of a service and of whatever it has started, at this moment [MiB]. */
export const residentOf = (leader: number): number =>
  groupOf(leader).reduce((sum, pid) => sum + residentMb(pid), 0);

function socketsOf(pid: string): number {
  try {
    const folder = `/proc/${pid}/fd`;
    return readdirSync(folder).filter((fd) => isSocket(`${folder}/${fd}`)).length;
  } catch {
    return 0;
  }
}

function isSocket(descriptor: string): boolean {
  try {
    return readlinkSync(descriptor).startsWith('socket:');
  } catch {
    return false;
  }
}

/** Sockets that a service and whatever it has started hold open at this moment. */
export const openSockets = (leader: number): number =>
  groupOf(leader).reduce((sum, pid) => sum + socketsOf(pid), 0);

export interface MemoryWatch {
  /** Resident memory when the watch began [MiB]. */
  startMb: number;
  /** @returns the most since then [MiB], over all processes of the group together */
  stop(): number;
}

/** Watches the resident memory of a service and of whatever it has started. */
export function watchMemory(leader: number): MemoryWatch {
  const now = () => residentOf(leader);
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
