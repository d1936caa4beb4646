import { z } from 'zod';
import { readOrcid } from './orcid-number';

export { orcidCheckCharacter, readOrcid } from './orcid-number';

/** An iD with or without its address; its last character must fit the others. */
export const orcidSchema = z.string().transform((text, context) => {
  const orcid = readOrcid(text);
  if (orcid === null) {
    context.addIssue({
      code: 'custom',
      message:
        'an ORCID iD such as 0000-0002-1825-0097, whose last character fits the ones before it',
    });
    return z.NEVER;
  }
  return orcid;
});
