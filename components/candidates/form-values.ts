/** A number of a form field; an empty one is null. */
export function numberOf(form: FormData, name: string): number | null {
  const text = String(form.get(name) ?? '').trim();
  return text === '' ? null : Number(text);
}

/** The text of a form field; an empty one is null. */
export function textOf(form: FormData, name: string): string | null {
  const text = String(form.get(name) ?? '').trim();
  return text === '' ? null : text;
}
