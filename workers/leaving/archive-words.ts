import type { ArchivedTable } from './archive-tables';

/** The README of an archive: what is in it, and what is not. */
export function describeArchive(
  facts: { name: string; slug: string; at: string; schemaVersion: string },
  tables: readonly ArchivedTable[],
): string {
  const bytes = tables.flatMap(({ name, bytesColumns }) =>
    bytesColumns.map((column) => `  ${name}.${column}`),
  );
  return `${[
    `${facts.name} (${facts.slug})`,
    `Everything of this collaboration in Rarebound at ${facts.at}, read at one moment.`,
    `Version of the tables: ${facts.schemaVersion}`,
    '',
    'What is here',
    '  contents.json        version of the tables, columns and number of rows of each, all files',
    '  people.jsonl         id and name of everybody who is named by an id: no address, no password',
    '  tables/<name>.jsonl  one row a line, as JSON; units are in the names; times are in UTC',
    '  uploads/<id>/        every uploaded file as it came',
    '  releases/R-<n>/      the files of each published release, with its bundle',
    '  frozen-runs/<id>.zip the inputs that were frozen with a run, as a bundle',
    '',
    'Bytes stand as base64. completeness_map.node_values holds little-endian 16-bit whole numbers,',
    'probability = value / 65535, shape [mass_mjup, semi_major_axis_au].',
    ...bytes,
    '',
    'What is not here',
    '  passwords, sessions, hashes of tokens, codes and links; letters on their way; and parts of',
    '  computations that have not ended. Rows of other collaborations are in no table.',
    '',
    'To compute a published result again, bring the bundle of its release into any Rarebound.',
    '',
  ].join('\n')}`;
}
