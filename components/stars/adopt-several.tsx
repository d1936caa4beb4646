'use client';

import { useState } from 'react';
import { useSchema } from '@/components/hooks/use-schema';
import { Button } from '@/components/ui/button';
import { CheckboxField } from '@/components/ui/checkbox-field';
import { SelectField } from '@/components/ui/select-field';
import type { AdoptedQuantity, AdoptionChoices, StarView } from '@/lib/schemas/stars';
import { AdoptDialog } from './adopt-dialog';
import { ageWords, distanceWords } from './star-words';

const loadSchema = async () => (await import('@/lib/schemas/stars')).previewAdoptionSchema;

interface AdoptSeveralProps {
  collaboration: string;
  quantity: AdoptedQuantity;
  stars: StarView[];
  onAdopted(): void;
}

/** Adopts the values of one survey for several stars, in one table. */
export function AdoptSeveral({ collaboration, quantity, stars, onAdopted }: AdoptSeveralProps) {
  const [isOpen, setOpen] = useState(false);
  const [slug, setSlug] = useState<string>();
  const [left, setLeft] = useState<ReadonlySet<string>>(new Set());
  const surveys = new Map(
    stars.flatMap(({ entries }) =>
      entries
        .filter((entry) => entry[quantity] !== null)
        .map(({ survey }) => [survey.slug, survey.name] as const),
    ),
  );
  const chosen = slug ?? [...surveys.keys()][0];
  const offered = stars.flatMap((star) => {
    const entry = star.entries.find(({ survey }) => survey.slug === chosen);
    if (!entry) return [];
    const words =
      quantity === 'age'
        ? entry.age && ageWords(entry.age)
        : entry.distance && distanceWords(entry.distance);
    return words ? [{ star, targetId: entry.targetId, words }] : [];
  });
  const taken = offered.filter(({ star }) => !left.has(star.id));
  const checked = useSchema(loadSchema)?.safeParse({
    quantity,
    choices: taken.map(({ star, targetId }) => ({
      starId: star.id,
      choice: { kind: 'entry', targetId },
    })),
  });
  const choices: AdoptionChoices | null = checked?.data ?? null;
  const toggle = (id: string) => {
    const next = new Set(left);
    if (!next.delete(id)) next.add(id);
    setLeft(next);
  };
  return (
    <>
      <div className="mb-3">
        <Button onClick={() => setOpen(true)}>Adopt {quantity}s of one survey</Button>
      </div>
      {isOpen && (
        <AdoptDialog
          collaboration={collaboration}
          title={`Adopt ${quantity}s of one survey`}
          choices={choices}
          missing="Tick at least one star"
          onClose={() => setOpen(false)}
          onAdopted={onAdopted}
        >
          <SelectField
            label="Survey"
            value={chosen}
            options={[...surveys].map(([value, label]) => ({ value, label }))}
            onChange={(event) => setSlug(event.target.value)}
          />
          <fieldset className="grid max-h-56 gap-1 overflow-y-auto">
            <legend className="sr-only">Stars</legend>
            {offered.map(({ star, words }) => (
              <CheckboxField
                key={star.id}
                label={`${star.name}: ${words}`}
                checked={!left.has(star.id)}
                onChange={() => toggle(star.id)}
              />
            ))}
          </fieldset>
        </AdoptDialog>
      )}
    </>
  );
}
