const day = new Intl.DateTimeFormat('en-GB', {
  day: 'numeric',
  month: 'long',
  year: 'numeric',
  timeZone: 'UTC',
});

/** "2 February 2026", the same on server and screen whatever the zone. */
export function formatDay(moment: string): string {
  return day.format(new Date(moment));
}

/** "41 s", "3 min 20 s", "2 h 5 min". */
export function formatDuration(seconds: number): string {
  if (seconds < 10) return `${Math.max(0, seconds).toFixed(1)}\u2009s`;
  const whole = Math.round(seconds);
  if (whole < 90) return `${whole}\u2009s`;
  if (whole < 5400) {
    const rest = whole % 60;
    return `${Math.floor(whole / 60)}\u2009min${rest === 0 ? '' : ` ${rest}\u2009s`}`;
  }
  return `${Math.floor(whole / 3600)}\u2009h ${Math.floor((whole % 3600) / 60)}\u2009min`;
}

/** How long a job took; undefined while it has no end. */
export function durationOf(job: {
  startedAt: string | null;
  finishedAt: string | null;
}): string | undefined {
  if (!job.startedAt || !job.finishedAt) return undefined;
  return formatDuration((Date.parse(job.finishedAt) - Date.parse(job.startedAt)) / 1000);
}

/** The first four characters, as fingerprints are shown. */
export function fingerprint(digest: string): string {
  return digest.slice(0, 4);
}
