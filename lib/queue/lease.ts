/** How long an attempt holds its job without a sign of life; the database's clock counts. */
export const LEASE_S = 15;
/** A worker shows that it lives this often. */
export const HEARTBEAT_MS = 5000;
/** A job that stopped this often without an end is failed. */
export const MAX_ATTEMPTS = 3;
