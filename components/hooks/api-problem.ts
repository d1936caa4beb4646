import { describeFault, type Fault, type RefusedFile } from '@/lib/errors';
import type { Problem } from '@/lib/schemas/problem';

/** A refused request as a screen shows it: sentences, and the places of all faults. */
export class ApiProblem extends Error {
  readonly status: number;
  readonly code: string;
  readonly faults: Fault[];
  /** How many faults there were in all; `faults` may list fewer. */
  readonly faultCount: number;
  /** Roles of which one would have been enough. */
  readonly needed: readonly string[];
  /** What a refused file still tells. */
  readonly refused: RefusedFile | undefined;

  constructor(problem: Problem) {
    super(problem.detail || problem.title);
    this.name = 'ApiProblem';
    this.status = problem.status;
    this.code = problem.code;
    this.faults = problem.errors ?? [];
    this.faultCount = problem.errorCount ?? this.faults.length;
    this.needed = problem.needed ?? [];
    this.refused = problem.refused;
  }

  /** One line a fault, or the detail alone where no place is known. */
  get sentences(): string[] {
    return this.faults.length === 0 ? [this.message] : this.faults.map(describeFault);
  }
}

/** Where the connection ended before an answer came. */
export const noAnswer = (detail: string) =>
  new ApiProblem({ type: 'about:blank', title: 'No answer', status: 0, code: 'no-answer', detail });

/** The problem document of a refused answer; a body of another kind still gives a sentence. */
export async function readProblem(response: Response): Promise<ApiProblem> {
  const body: unknown = await response.json().catch(() => null);
  const { problemSchema } = await import('@/lib/schemas/problem');
  const parsed = problemSchema.safeParse(body);
  if (parsed.success) return new ApiProblem(parsed.data);
  return new ApiProblem({
    type: 'about:blank',
    title: 'Unreadable answer',
    status: response.status,
    code: 'unreadable',
    detail: `The server answered with status ${response.status} and no reason. Try again; if it stays, tell whoever runs this server.`,
  });
}

/** The sentence for anything that was thrown. */
export function sentenceOf(reason: unknown): string {
  if (reason instanceof ApiProblem) return reason.sentences.join(' ');
  return reason instanceof Error ? reason.message : String(reason);
}
