'use client';

import { createContext, type ReactNode, useCallback, useContext } from 'react';

const TimeZone = createContext('UTC');

/** The time zone of all dates below it. */
export function TimeZoneProvider({ zone, children }: { zone: string; children: ReactNode }) {
  return <TimeZone.Provider value={zone}>{children}</TimeZone.Provider>;
}

export const useTimeZone = () => useContext(TimeZone);

export type MomentForm = 'time' | 'day' | 'date' | 'full' | 'clock';

const forms: Record<MomentForm, Intl.DateTimeFormatOptions> = {
  time: { day: 'numeric', month: 'short', hour: '2-digit', minute: '2-digit' },
  day: { day: 'numeric', month: 'short', year: 'numeric' },
  date: { day: 'numeric', month: 'long', year: 'numeric' },
  full: { day: 'numeric', month: 'short', year: 'numeric', hour: '2-digit', minute: '2-digit' },
  clock: { hour: '2-digit', minute: '2-digit' },
};

/** Writers by form and zone: making one costs a hundred times what it costs to use it. */
const writers = new Map<string, Intl.DateTimeFormat>();

function writerFor(form: MomentForm, timeZone: string): Intl.DateTimeFormat {
  const key = `${form} ${timeZone}`;
  let writer = writers.get(key);
  if (!writer) {
    writer = new Intl.DateTimeFormat('en-GB', { ...forms[form], timeZone });
    writers.set(key, writer);
  }
  return writer;
}

/** Writes moments in the collaboration's time zone. */
export function useMoment(): (moment: string | number, form?: MomentForm) => string {
  const timeZone = useTimeZone();
  return useCallback(
    (moment, form = 'time') => writerFor(form, timeZone).format(new Date(moment)),
    [timeZone],
  );
}

/** Writes the day of a moment there: "2 February 2026". */
export function useDay(): (moment: string | number) => string {
  const moment = useMoment();
  return useCallback((at) => moment(at, 'date'), [moment]);
}
