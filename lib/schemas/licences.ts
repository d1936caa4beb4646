/** Licences that a release may carry, with the addresses of their texts. */
export const licences = {
  'CC-BY-4.0': 'https://creativecommons.org/licenses/by/4.0/',
  'CC-BY-SA-4.0': 'https://creativecommons.org/licenses/by-sa/4.0/',
  'CC0-1.0': 'https://creativecommons.org/publicdomain/zero/1.0/',
  'ODC-By-1.0': 'https://opendatacommons.org/licenses/by/1-0/',
} as const;
