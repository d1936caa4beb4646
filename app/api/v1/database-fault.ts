import { Conflict, LabError } from '@/lib/errors';

const UNAVAILABLE = /^Sequelize(Connection|HostNotFound|HostNotReachable|ConnectionAcquire)/;
/**
 * Ended by the server, or by the network, while a statement was on its way; a server that starts or
 * stops, or has no connection or memory left.
 */
const LOST =
  /^(57P0[1-5]|08...|25P03|53[23]00|ECONNRESET|ECONNREFUSED|EPIPE)$|Connection terminated|connection error|Client was closed/;
const DISK_FULL = '53100';
const CUT_OFF = '57014';

/** Whether the database was not there, or went away in between. */
export function isDatabaseAway(error: unknown): boolean {
  if (!(error instanceof Error)) return false;
  if (UNAVAILABLE.test(error.name)) return true;
  const { original } = error as { original?: unknown };
  if (original instanceof Error) return isDatabaseAway(original);
  return LOST.test(codeOf(error)) || LOST.test(error.message);
}

function codeOf(error: Error): string {
  const { original = error } = error as Error & { original?: unknown };
  const { code } = original as { code?: unknown };
  return typeof code === 'string' ? code : '';
}

/** Faults of the database that a person can act on; everything else stays as it is. */
export function databaseFault(error: unknown): unknown {
  if (!(error instanceof Error) || error instanceof LabError) return error;
  if (error.name === 'SequelizeUniqueConstraintError') {
    return new Conflict('Somebody was quicker: that name or number is taken');
  }
  if (codeOf(error) === DISK_FULL) {
    return new LabError(
      'disk-full',
      503,
      'The disk of the database is full; nothing was stored. An owner of this server must make room',
    );
  }
  if (codeOf(error) === CUT_OFF) {
    const words = 'The database took too long, and nothing was stored. Try again in a moment';
    return new LabError('took-too-long', 503, words);
  }
  if (UNAVAILABLE.test(error.name)) {
    return new LabError('unavailable', 503, 'The database does not answer; nothing was stored');
  }
  if (isDatabaseAway(error)) {
    const words = 'The connection to the database was lost: read again whether the change is there';
    return new LabError('unavailable', 503, words);
  }
  return error;
}
