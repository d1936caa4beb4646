/** One side of a comparison as the address names it. */
export interface SideAddress {
  /** "A-31". */
  key: string;
  /** Undefined: the newest finished run. */
  run?: number;
  /** The same run with its detections set aside. */
  isZero: boolean;
}

export const mostSides = 6;
export const sideLetters = ['A', 'B', 'C', 'D', 'E', 'F'] as const;

/** Reads "A-31,A-31.2,A-32:none"; what is no analysis is left out, and so is what comes twice. */
export function readSides(text: string | undefined): SideAddress[] {
  const parts = [...new Set((text ?? '').split(','))];
  return parts
    .flatMap((part): SideAddress[] => {
      const match = /^(A-\d{1,9})(?:\.(\d{1,6}))?(:none)?$/.exec(part.trim());
      if (!match) return [];
      const run = match[2] === undefined ? {} : { run: Number(match[2]) };
      return [{ key: match[1], ...run, isZero: match[3] !== undefined }];
    })
    .slice(0, mostSides);
}

/** "A-31.2:none". */
export function writeSide({ key, run, isZero }: SideAddress): string {
  return `${key}${run === undefined ? '' : `.${run}`}${isZero ? ':none' : ''}`;
}

export function compareAddress(collaboration: string, sides: SideAddress[]): string {
  return `/${collaboration}/compare?with=${sides.map(writeSide).join()}`;
}
