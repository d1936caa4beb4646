/** The package brings no types: the one function that the help uses. */
declare module 'katex' {
  interface KatexSettings {
    displayMode?: boolean;
    output?: 'html' | 'mathml' | 'htmlAndMathml';
    strict?: 'error' | 'warn' | 'ignore';
    throwOnError?: boolean;
  }
  const katex: { renderToString(tex: string, settings?: KatexSettings): string };
  export default katex;
}
