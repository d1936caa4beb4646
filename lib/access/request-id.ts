import { AsyncLocalStorage } from 'node:async_hooks';

const current = new AsyncLocalStorage<string>();

/** Does the work of one request, whose id then stands in the jobs that it asks for. */
export function withinRequest<Result>(requestId: string, work: () => Result): Result {
  return current.run(requestId, work);
}

/** @returns the id of the request that is being answered, null outside of any */
export const requestIdNow = (): string | null => current.getStore() ?? null;
