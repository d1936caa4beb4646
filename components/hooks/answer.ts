import type * as Answers from './answers';

/**
 * The schema by which an answer is read, loaded with the first question. A page that the server drew
 * needs none of them before, and they are a third of what it would otherwise wait for.
 */
export function answer<Name extends keyof typeof Answers>(
  name: Name,
): () => Promise<(typeof Answers)[Name]> {
  return async () => (await import('./answers'))[name];
}
