/** Tested in this order, since browsers also name those that they come from. */
const browsers: [RegExp, string][] = [
  [/Edg(e|A|iOS)?\//, 'Edge'],
  [/OPR\//, 'Opera'],
  [/Firefox\/|FxiOS\//, 'Firefox'],
  [/Chrome\/|CriOS\//, 'Chrome'],
  [/Safari\//, 'Safari'],
];
const systems: [RegExp, string][] = [
  [/iPhone|iPad/, 'iOS'],
  [/Android/, 'Android'],
  [/Windows/, 'Windows'],
  [/Macintosh|Mac OS X/, 'macOS'],
  [/Linux|X11/, 'Linux'],
];

const nameIn = (text: string, known: [RegExp, string][]) =>
  known.find(([pattern]) => pattern.test(text))?.[1];

/** "Firefox on Linux": what a browser says of itself, in a person's words. */
export function nameBrowser(userAgent: string | null): string {
  const browser = nameIn(userAgent ?? '', browsers) ?? 'A browser';
  const system = nameIn(userAgent ?? '', systems);
  return system === undefined ? browser : `${browser} on ${system}`;
}
