/** What a status of a refusal means, with the codes that come with it from everywhere. */
export const apiProblems: readonly { status: number; means: string; codes: readonly string[] }[] = [
  {
    status: 400,
    means: 'The request cannot be read: a key that is not known, a wrong query, no JSON',
    codes: ['key-unknown', 'json-invalid', 'not-utf8', 'both-given', 'idempotency-key-refused'],
  },
  { status: 401, means: 'No token, or one that has ended', codes: ['not-signed-in'] },
  {
    status: 403,
    means: 'The token lacks the scope, or you lack the role, which “needed” names',
    codes: ['not-allowed', 'cross-site'],
  },
  {
    status: 404,
    means: 'Absent, or not yours to see: the two are not told apart',
    codes: ['not-found'],
  },
  {
    status: 409,
    means: 'Right in itself, but not as things stand',
    codes: ['conflict', 'idempotency-key-busy', 'idempotency-key-lost'],
  },
  { status: 412, means: 'Changed since it was read', codes: ['changed-meanwhile'] },
  { status: 413, means: 'Longer than is taken', codes: ['too-large'] },
  { status: 415, means: 'Another content type is needed', codes: ['content-type'] },
  {
    status: 422,
    means: 'Read, but not good: “errors” has one entry a fault, with its place',
    codes: ['value-missing', 'choice-unknown', 'out-of-range', 'idempotency-key-reused'],
  },
  {
    status: 429,
    means: 'Too many requests: Retry-After says how long to wait',
    codes: ['too-many'],
  },
  {
    status: 503,
    means:
      'The database does not answer, or its disk is full: “detail” says what is stored; Retry-After',
    codes: ['unavailable', 'disk-full'],
  },
  {
    status: 507,
    means: 'The disk for incoming files is full; nothing was stored',
    codes: ['disk-full'],
  },
];
