/** One fault found in a file, body or form field: where it is, what was found, what was expected. */
export interface Fault {
  code: string;
  file?: string;
  line?: number;
  column?: string;
  row?: number;
  item?: string;
  found?: string;
  expected?: string;
  hint?: string;
  /** The whole sentence where "found …; expected …" would read badly. */
  message?: string;
}

/** "where: found …; expected …. hint", the wording that files, forms and the API share. */
export function describeFault(fault: Fault): string {
  const where = [
    fault.file,
    fault.line === undefined ? undefined : `line ${fault.line}`,
    fault.row === undefined ? undefined : `row ${fault.row}`,
    fault.item,
    fault.column === undefined ? undefined : `column "${fault.column}"`,
  ]
    .filter(Boolean)
    .join(', ');
  const parts: string[] = [];
  if (fault.found !== undefined) parts.push(`found ${fault.found}`);
  if (fault.expected !== undefined) parts.push(`expected ${fault.expected}`);
  const core = fault.message ?? parts.join('; ');
  const sentence = [where, core].filter(Boolean).join(': ');
  return fault.hint === undefined ? sentence : `${sentence}. ${fault.hint}`;
}

/** Base of every refusal that a person may read: never holds SQL, a stack or a path. */
export class LabError extends Error {
  readonly code: string;
  readonly status: number;
  constructor(code: string, status: number, message: string) {
    super(message);
    this.name = new.target.name;
    this.code = code;
    this.status = status;
  }
}

/** What a refused file still tells: its columns, the lines around its faults, the rows at fault. */
export interface RefusedFile {
  columns: { index: number; heading: string; readAs: string | null; unit: string | null }[];
  excerpts: { line: number; before: string | null; text: string; after: string | null }[];
  offending: {
    headings: string[];
    rows: {
      place: string;
      cells: string[];
      column: string | null;
      code: string;
      found: string;
      expected: string;
    }[];
    count: number;
  } | null;
  /** The mapping of columns that was applied because an earlier file had these headings. */
  remembered: { id: string; columnMap: Record<string, string> } | null;
}

/** Bad input: one or more faults, each with its place. `status` is 400 for a request, 422 for content. */
export class InputError extends LabError {
  readonly faults: Fault[];
  /** How many faults there were in all; `faults` may list fewer. */
  readonly count: number;
  readonly refused: RefusedFile | undefined;
  constructor(
    faults: Fault | Fault[],
    options: { status?: number; count?: number; refused?: RefusedFile } = {},
  ) {
    const list = Array.isArray(faults) ? faults : [faults];
    super(list[0]?.code ?? 'input', options.status ?? 422, list.map(describeFault).join('\n'));
    this.faults = list;
    this.count = options.count ?? list.length;
    this.refused = options.refused;
  }
}

/** Nobody is signed in, or the token is not known: 401. */
export class NotSignedIn extends LabError {
  constructor(message = 'Sign in, or send a bearer token') {
    super('not-signed-in', 401, message);
  }
}

/** Known person, missing role: names the role and what may be done instead. */
export class AccessError extends LabError {
  readonly needed: readonly string[];
  constructor(message: string, needed: readonly string[] = []) {
    super('not-allowed', 403, message);
    this.needed = needed;
  }
}

/** Absent, or not visible to the person who asks: the two are not told apart. */
export class NotFound extends LabError {
  constructor(what: string) {
    super('not-found', 404, `No such ${what}`);
  }
}

/** The request is right but the state of the thing does not allow it. */
export class Conflict extends LabError {
  constructor(message: string, code = 'conflict') {
    super(code, 409, message);
  }
}

/** Too many attempts: `retryAfterS` goes into the Retry-After header. */
export class TooMany extends LabError {
  readonly retryAfterS: number;
  constructor(message: string, retryAfterS: number) {
    super('too-many', 429, message);
    this.retryAfterS = retryAfterS;
  }
}
