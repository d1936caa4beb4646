import { randomInt } from 'node:crypto';
import type { Role } from '@/lib/schemas/common';

export interface DemoPerson {
  key: string;
  name: string;
  roles: Role[];
  /** Printed at the start, so that a visitor can look around as each of them. */
  isShown: boolean;
}

export const demoPeople: DemoPerson[] = [
  { key: 'marrand', name: 'Ilse Marrand', roles: ['owner', 'collaborator'], isShown: true },
  { key: 'linhart', name: 'Petra Linhart', roles: ['statistician', 'collaborator'], isShown: true },
  { key: 'vesk', name: 'Tomo Vesk', roles: ['collaborator'], isShown: true },
  { key: 'castellan', name: 'Rui Castellan', roles: ['author'], isShown: true },
  { key: 'orlu', name: 'Ada Orlu', roles: ['collaborator'], isShown: false },
  { key: 'hadley', name: 'Noor Hadley', roles: ['student'], isShown: true },
];

const words =
  'anchor barnacle beacon breaker cockle compass cutter dinghy estuary fathom gannet harbour jetty keel lantern lagoon mooring narwhal oyster pebble pilot plover rudder sextant shingle skerry spindrift tern tide voyage wader winch'.split(
    ' ',
  );

/** Five words and a number: each laboratory gets passwords of its own, kept in its data folder. */
export function makePassword(): string {
  const picked = Array.from({ length: 5 }, () => words[randomInt(words.length)]);
  return `${picked.join('-')}-${randomInt(10, 100)}`;
}
