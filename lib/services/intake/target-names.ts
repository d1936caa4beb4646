import { foldName } from '@/lib/formats';
import type { TargetRow } from '@/models';

/** Targets of a survey by any of their names, without regard to case and spaces. */
export class TargetNames {
  private readonly rows = new Map<string, TargetRow>();
  constructor(targets: TargetRow[]) {
    for (const target of targets) {
      for (const other of target.otherNames) this.rows.set(foldName(other), target);
    }
    // A target's own name wins over another's alias.
    for (const target of targets) this.rows.set(target.foldedName, target);
  }
  find(name: string): TargetRow | undefined {
    return this.rows.get(foldName(name));
  }
}
