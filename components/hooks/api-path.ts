/** The one builder of addresses: also the key under which SWR keeps the answer. */
export function apiPath(collaboration: string, ...parts: (string | number)[]): string {
  return ['/api/v1/collaborations', collaboration, ...parts].map(encodePart).join('/');
}

/** An address with its query; undefined values are left out. */
export function withQuery(
  path: string,
  query: Record<string, string | number | undefined>,
): string {
  const search = new URLSearchParams();
  for (const [name, value] of Object.entries(query)) {
    if (value !== undefined) search.set(name, String(value));
  }
  const text = search.toString();
  return text === '' ? path : `${path}?${text}`;
}

function encodePart(part: string | number, index: number): string {
  return index === 0 ? String(part) : encodeURIComponent(part);
}
