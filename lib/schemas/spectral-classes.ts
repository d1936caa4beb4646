/** From hot to cool. */
export const spectralClasses = ['O', 'B', 'A', 'F', 'G', 'K', 'M', 'L', 'T', 'Y'] as const;
