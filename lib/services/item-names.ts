import { QueryTypes } from 'sequelize';
import { idSchema } from '@/lib/schemas/common';
import { database } from '@/models';

export interface ItemName {
  label: string;
  /** Below the collaboration's address; null where it has no page of its own. */
  path: string | null;
}

interface Reference {
  kind: string;
  id: string;
}

/** For each kind that the log names: its rows as id, label and path. */
const byId: Record<string, string> = {
  survey: `select id, name as label, '/surveys/' || slug as path
    from survey where collaboration_id = $1 and id = any($2::uuid[])`,
  star: `select id, name as label, '/stars/' || id as path
    from star where collaboration_id = $1 and id = any($2::uuid[])`,
  target: `select t.id, t.name || ' in ' || s.name as label, '/surveys/' || s.slug as path
    from target t join survey s on s.id = t.survey_id
    where t.collaboration_id = $1 and t.id = any($2::uuid[])`,
  upload: `select u.id, u.file_name as label, '/surveys/' || s.slug as path
    from upload u left join survey s on s.id = u.survey_id
    where u.collaboration_id = $1 and u.id = any($2::uuid[])`,
  candidate: `select c.id, t.name || ' ' || c.name as label, '/candidates/' || c.id as path
    from companion c join target t on t.id = c.target_id
    where c.collaboration_id = $1 and c.id = any($2::uuid[])`,
  analysis: `select id, 'A-' || number as label, '/analyses/A-' || number as path
    from analysis where collaboration_id = $1 and id = any($2::uuid[])`,
  run: `select r.id, 'A-' || a.number || ', run ' || r.number as label,
      '/analyses/A-' || a.number as path
    from run r join analysis a on a.id = r.analysis_id
    where r.collaboration_id = $1 and r.id = any($2::uuid[])`,
  study: `select f.id, 'A-' || a.number || ', run ' || r.number as label,
      '/analyses/A-' || a.number as path
    from study f join run r on r.id = f.run_id join analysis a on a.id = r.analysis_id
    where f.collaboration_id = $1 and f.id = any($2::uuid[])`,
  release: `select id, 'R-' || number as label, '/releases/R-' || number as path
    from release where collaboration_id = $1 and id = any($2::uuid[])`,
  exercise: `select id, 'E-' || number as label, '/exercises/E-' || number as path
    from exercise where collaboration_id = $1 and id = any($2::uuid[])`,
  'value-table': `select id, 'table ' || number || ' of ' || quantity || 's' as label,
      '/stars/ages' as path
    from value_table where collaboration_id = $1 and id = any($2::uuid[])`,
  'cooling-table': `select id, name as label, '/cooling' as path
    from cooling_table where collaboration_id = $1 and id = any($2::uuid[])`,
};

/** Kinds whose entries carry the key that pages show. */
const byKey: Record<string, (key: string) => string> = {
  population: (key) => `/populations/${key}`,
  sample: () => '/stars/samples',
  combination: () => '/surveys/combine',
};

const pages: Record<string, ItemName> = {
  'star-match': { label: 'overlaps', path: '/stars/overlaps' },
  member: { label: 'people', path: '/people' },
  invitation: { label: 'people', path: '/people' },
  collaboration: { label: 'the collaboration', path: '/settings' },
};

const keyOf = ({ kind, id }: Reference) => `${kind}:${id}`;

/** Names and pages of the things that entries of the log tell of, by "kind:id". */
export async function nameItems(
  collaborationId: string,
  references: readonly Reference[],
): Promise<Map<string, ItemName>> {
  const names = new Map<string, ItemName>();
  const wanted = new Map<string, Set<string>>();
  for (const reference of references) {
    const { kind, id } = reference;
    const known = byKey[kind] ? { label: id, path: byKey[kind](id) } : pages[kind];
    if (known) names.set(keyOf(reference), known);
    else if (byId[kind] && idSchema.safeParse(id).success) {
      wanted.set(kind, (wanted.get(kind) ?? new Set()).add(id));
    }
  }
  await Promise.all(
    [...wanted].map(async ([kind, ids]) => {
      const rows = await database().query<ItemName & { id: string }>(byId[kind], {
        bind: [collaborationId, [...ids]],
        type: QueryTypes.SELECT,
      });
      for (const { id, label, path } of rows) names.set(keyOf({ kind, id }), { label, path });
    }),
  );
  return names;
}
