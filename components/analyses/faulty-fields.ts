import { createContext, useCallback, useEffect, useId, useState } from 'react';

type Report = (field: string, words: string | undefined) => void;

/** Where a number field says that it holds what cannot be used; nobody listens by default. */
export const ReportFault = createContext<Report | undefined>(undefined);

/** Tells of a field as long as something is wrong with it and it is there. */
export function useFault(report: Report | undefined, words: string | undefined): void {
  const field = useId();
  useEffect(() => {
    if (!report || words === undefined) return;
    report(field, words);
    return () => report(field, undefined);
  }, [report, field, words]);
}

/** The fields of a page that hold what cannot be used. */
export function useFaultyFields(): { report: Report; words: string | undefined } {
  const [faults, setFaults] = useState<ReadonlyMap<string, string>>(new Map());
  const report = useCallback<Report>((field, words) => {
    setFaults((before) => {
      const next = new Map(before);
      if (words === undefined) next.delete(field);
      else next.set(field, words);
      return next;
    });
  }, []);
  const [first] = faults.values();
  return { report, words: first && `Correct the field in red first. ${first}` };
}
