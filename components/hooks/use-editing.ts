'use client';

import { useRef, useState } from 'react';
import { ChangedMeanwhile } from './change';

/** A conflict as a form shows it: what stands there now beside what the person typed. */
export interface Conflict<Part> {
  reason: ChangedMeanwhile<Part>;
  mine: Part;
  /** The newer one was taken into the form. */
  isTaken: boolean;
}

/** What a form was opened with, held while it is open, whatever the page learns meanwhile. */
export interface Editing<Part> {
  opened(): Part;
  conflict: Conflict<Part> | null;
  /**
   * Stores what was typed. A conflict is kept for the notice and answers false; every other refusal
   * is thrown.
   */
  attempt(mine: Part, work: (opened: Part) => Promise<unknown>): Promise<boolean>;
  /** Goes on from the newer one: `taken` when it stands in the form, else to store mine over it. */
  goOn(isTaken: boolean): void;
  /** Puts the notice away; what was opened stays what it was. */
  leave(): void;
  /** Goes on from what is stored now. */
  begin(stored: Part): void;
}

export function useEditing<Part>(initial: Part): Editing<Part> {
  const opened = useRef(initial);
  const [conflict, setConflict] = useState<Conflict<Part> | null>(null);
  return {
    opened: () => opened.current,
    conflict,
    attempt: async (mine, work) => {
      setConflict(null);
      try {
        await work(opened.current);
        return true;
      } catch (reason) {
        if (!(reason instanceof ChangedMeanwhile)) throw reason;
        setConflict({ reason, mine, isTaken: false });
        return false;
      }
    },
    goOn: (isTaken) => {
      if (conflict === null) return;
      opened.current = conflict.reason.now;
      setConflict(isTaken ? { ...conflict, isTaken } : null);
    },
    leave: () => setConflict(null),
    begin: (stored) => {
      opened.current = stored;
      setConflict(null);
    },
  };
}
