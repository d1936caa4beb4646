import { execFileSync } from 'node:child_process';
import { mkdirSync } from 'node:fs';

/** A disk in memory that can be filled; only root may mount one. */
export class SmallDisk {
  private constructor(readonly folder: string) {}

  /** @throws Error with the words of `mount` where this machine refuses it */
  static mount(folder: string, megabytes: number): SmallDisk {
    mkdirSync(folder, { recursive: true });
    execFileSync('mount', ['-t', 'tmpfs', '-o', `size=${megabytes}m,mode=0755`, 'tmpfs', folder]);
    return new SmallDisk(folder);
  }

  resize(megabytes: number): void {
    execFileSync('mount', ['-o', `remount,size=${megabytes}m`, this.folder]);
  }

  unmount(): void {
    execFileSync('umount', ['--lazy', this.folder]);
  }
}
