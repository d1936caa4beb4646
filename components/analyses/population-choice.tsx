'use client';

import { AxisRange, MassRange, PowerLaws } from '@/components/populations/law-notation';
import { reachesBeyond } from '@/components/populations/reaches-beyond';
import { CheckboxField } from '@/components/ui/checkbox-field';
import { EmptyState } from '@/components/ui/empty-state';
import { LinkButton } from '@/components/ui/link-button';
import { SectionOpener } from '@/components/ui/section-opener';
import { SelectField } from '@/components/ui/select-field';
import { isPlainPowerLaw } from '@/lib/schemas/plain-power-law';
import type { ListedPopulation } from '@/lib/schemas/populations';

interface PopulationChoiceProps {
  collaboration: string;
  populations: ListedPopulation[];
  chosen: string;
  onChange(id: string): void;
  /** Nodes of the maps, where they are known. */
  grid?: { massMjup: number[]; semiMajorAxisAu: number[] };
  zeroOutsideMaps: boolean;
  onZeroOutsideMaps(isAllowed: boolean): void;
}

export function PopulationChoice(props: PopulationChoiceProps) {
  const { collaboration, populations, chosen, onChange, grid } = props;
  const population = populations.find((candidate) => candidate.id === chosen);
  return (
    <section>
      <SectionOpener
        number={2}
        title="Population"
        help="population"
        context="how planets are spread in mass and semi-major axis"
      />
      {populations.length === 0 ? (
        <EmptyState
          title="No population yet"
          actions={
            <LinkButton href={`/${collaboration}/populations/new`} variant="primary" icon="add">
              Describe a population
            </LinkButton>
          }
        >
          A limit holds for planets of stated masses and orbits: describe them first.
        </EmptyState>
      ) : (
        <div className="grid gap-3">
          <SelectField
            label="Population"
            isLabelHidden
            value={chosen}
            onChange={(event) => onChange(event.target.value)}
            options={populations.map((candidate) => ({
              value: candidate.id,
              label: `${candidate.key}, version ${candidate.version}: ${candidate.name}`,
            }))}
          />
          {population && (
            <p className="text-ink2 text-note">
              <PowerLaws definition={population.definition} />
              {isPlainPowerLaw(population.definition) && (
                <>
                  , for planets of <MassRange definition={population.definition} /> at{' '}
                  <AxisRange definition={population.definition} />
                </>
              )}
              .
            </p>
          )}
          {population && grid && reachesBeyond(population.definition, grid) && (
            <CheckboxField
              label="Count the part beyond the maps as never seen"
              hint="The ranges reach past the map grid. Without this the run is refused; with it the limit rises."
              checked={props.zeroOutsideMaps}
              onChange={(event) => props.onZeroOutsideMaps(event.target.checked)}
            />
          )}
        </div>
      )}
    </section>
  );
}
