'use client';

import { TextAction } from '@/components/ui/text-action';
import { TextField } from '@/components/ui/text-field';
import { readOrcid } from '@/lib/schemas/orcid-number';
import type { Author } from '@/lib/schemas/releases';

/** What is wrong with an iD, while it is written. */
function orcidFault(orcid: string | undefined): string | undefined {
  if (!orcid?.trim() || readOrcid(orcid) !== null) return undefined;
  return 'The last character does not fit the others, or digits are missing';
}

/** Authors in their order: name, where they work, ORCID iD. */
export function AuthorFields({
  authors,
  onChange,
}: {
  authors: Author[];
  onChange(authors: Author[]): void;
}) {
  const set = (at: number, change: Partial<Author>) =>
    onChange(authors.map((author, i) => (i === at ? { ...author, ...change } : author)));
  return (
    <fieldset className="min-w-0">
      <legend className="mb-1.5 font-semibold text-note">Authors, in their order</legend>
      <ol className="grid gap-4">
        {authors.map((author, i) => (
          // biome-ignore lint/suspicious/noArrayIndexKey: authors have no id, and their place is what tells them apart
          <li key={i} className="grid gap-x-3 gap-y-2 border-rule border-b pb-4 sm:grid-cols-2">
            <TextField
              label={`Name of author ${i + 1}`}
              value={author.name}
              maxLength={100}
              onChange={(event) => set(i, { name: event.target.value })}
            />
            <TextField
              label="Affiliation"
              value={author.affiliation ?? ''}
              maxLength={200}
              onChange={(event) => set(i, { affiliation: event.target.value })}
            />
            <TextField
              label="ORCID iD"
              placeholder="0000-0002-1825-0097"
              value={author.orcid ?? ''}
              error={orcidFault(author.orcid)}
              onChange={(event) => set(i, { orcid: event.target.value })}
            />
            {authors.length > 1 && (
              <div className="flex items-end pb-1.5">
                <TextAction onClick={() => onChange(authors.filter((_, at) => at !== i))}>
                  Take out<span className="sr-only"> author {i + 1}</span>
                </TextAction>
              </div>
            )}
          </li>
        ))}
      </ol>
      <div className="mt-2">
        <TextAction icon="add" onClick={() => onChange([...authors, { name: '' }])}>
          Another author
        </TextAction>
      </div>
    </fieldset>
  );
}
