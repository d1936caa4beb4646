type Level = 'info' | 'warning' | 'error';

/** One JSON line, UTC; facts never hold a password, a token or an address of mail. */
export function log(level: Level, event: string, facts: Record<string, unknown> = {}): void {
  const line = { at: new Date().toISOString(), level, event, ...facts };
  process.stdout.write(`${JSON.stringify(line)}\n`);
}

/** What a log may say of an error: never more than its own words and where it arose. */
export function describeError(error: unknown): { message: string; stack?: string } {
  if (error instanceof Error) return { message: error.message, stack: error.stack };
  return { message: String(error) };
}
