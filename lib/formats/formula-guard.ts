const startsFormula = /^[=+\-@\t\r]/;
const isGuarded = /^'+[=+\-@\t\r]/;

/** A leading ' before text that a spreadsheet would run; text that looks guarded gets one more. */
export function addFormulaGuard(text: string): string {
  return startsFormula.test(text) || isGuarded.test(text) ? `'${text}` : text;
}

/** The text behind the guard that addFormulaGuard writes. */
export function removeFormulaGuard(text: string | null): string | null {
  return text !== null && isGuarded.test(text) ? text.slice(1) : text;
}
