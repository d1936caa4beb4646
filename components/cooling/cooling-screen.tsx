'use client';

import { useState } from 'react';
import { TrackChart } from '@/components/charts/track-chart';
import { sentenceOf } from '@/components/hooks/api-problem';
import { ChangedMeanwhile } from '@/components/hooks/change';
import { nameStart, useCoolingRelation } from '@/components/hooks/use-cooling';
import { Notice } from '@/components/ui/notice';
import { PageTitle } from '@/components/ui/page-title';
import { SectionOpener } from '@/components/ui/section-opener';
import { SelectField } from '@/components/ui/select-field';
import type { CoolingRelationView, StartCondition } from '@/lib/schemas/cooling';
import type { CoolingTableView } from '@/lib/schemas/surveys';
import { CoolingList } from './cooling-list';
import { differenceOf, sharedBands, tracksOf } from './tracks';
import { startWords, UsedBy } from './used-by';

interface CoolingScreenProps {
  collaboration: string;
  tables: CoolingTableView[];
  canName: boolean;
}

export const BUILT_IN = 'built-in';

/** The cooling relations: what each covers and starts from, its tracks, and how two differ. */
export function CoolingScreen({ collaboration, tables, canName }: CoolingScreenProps) {
  const [id, setId] = useState(tables[0]?.id ?? BUILT_IN);
  const [otherId, setOtherId] = useState<string>();
  const [band, setBand] = useState<string>();
  const shown = useCoolingRelation(collaboration, id);
  const other = useCoolingRelation(collaboration, otherId);
  const relation = shown.data;
  const error = shown.error ?? other.error;
  const options = [
    ...tables.map(({ id: value, name }) => ({ value, label: name })),
    { value: BUILT_IN, label: 'approximate cooling law (built in)' },
  ];
  const bands = relation ? Object.keys(relation.magnitudes) : [];
  const current = band !== undefined && bands.includes(band) ? band : bands[0];
  return (
    <>
      <PageTitle
        title="Cooling"
        crumbs={[{ href: `/${collaboration}/surveys`, label: 'Surveys' }, { label: 'Cooling' }]}
        context="How bright a companion of a mass is at an age. A survey names the relation of its maps, and each map keeps which it was made with."
      />
      <div className="grid grid-cols-1 gap-8 pb-10">
        <section>
          <SectionOpener number={1} title="Relations" help="cooling-model" />
          <CoolingList tables={tables} shownId={id} builtInId={BUILT_IN} onShow={setId} />
        </section>
        {error !== undefined && (
          <Notice tone="bad" title="The relation could not be read.">
            {sentenceOf(error)}
          </Notice>
        )}
        {relation && current ? (
          <div className="grid gap-x-14 gap-y-8 xl:grid-cols-2">
            <section className="min-w-0">
              <SectionOpener
                number={2}
                title={`Tracks of ${relation.name}`}
                help="cooling-start"
                context={startWords(relation)}
              />
              <div className="mb-4 grid max-w-md grid-cols-2 gap-3">
                <SelectField
                  label="Band"
                  value={current}
                  onChange={(event) => setBand(event.target.value)}
                  options={bands.map((value) => ({ value, label: value }))}
                />
                {canName && !relation.isApproximate && (
                  <StartField
                    collaboration={collaboration}
                    relation={relation}
                    onNamed={(next) => void shown.mutate(next, { revalidate: false })}
                    onNewer={() => void shown.mutate()}
                  />
                )}
              </div>
              {relation.isApproximate && (
                <Notice tone="warn" title="An approximation, not for publication.">
                  A black body: too faint below 5 Jupiter masses, where limits become too loose;
                  single bands err by 1 to 3 magnitudes below 1000 K. Source: {relation.source}.
                </Notice>
              )}
              <TrackChart
                subject={`absolute magnitude in ${current}`}
                ageMyr={Float64Array.from(relation.ageMyr)}
                tracks={tracksOf(relation, current)}
              />
            </section>
            <section className="min-w-0">
              <SectionOpener number={3} title="Against another" context="in magnitudes" />
              <div className="mb-4 max-w-md">
                <SelectField
                  label="Compared with"
                  value={otherId ?? ''}
                  onChange={(event) => setOtherId(event.target.value || undefined)}
                  options={[
                    { value: '', label: 'none' },
                    ...options.filter(({ value }) => value !== id),
                  ]}
                />
              </div>
              {other.data && <Difference first={relation} second={other.data} band={current} />}
            </section>
            <section className="min-w-0 xl:col-span-2">
              <SectionOpener
                number={4}
                title="Where it is used"
                context="a target outside it is reported, never extrapolated"
              />
              <UsedBy collaboration={collaboration} relation={relation} />
            </section>
          </div>
        ) : (
          error === undefined && <p className="text-ink3">The relation is on its way.</p>
        )}
      </div>
    </>
  );
}

const starts: StartCondition[] = ['hot', 'warm', 'cold', 'unstated'];

interface StartFieldProps {
  collaboration: string;
  relation: CoolingRelationView;
  onNamed(relation: CoolingRelationView): void;
  /** Somebody else named it. */
  onNewer(): void;
}

function StartField({ collaboration, relation, onNamed, onNewer }: StartFieldProps) {
  const [refusal, setRefusal] = useState<string>();
  const name = async (value: string) => {
    setRefusal(undefined);
    try {
      const start = starts.find((one) => one === value) ?? relation.startCondition;
      onNamed(await nameStart(collaboration, relation.id, relation.startCondition, start));
    } catch (reason) {
      setRefusal(sentenceOf(reason));
      if (reason instanceof ChangedMeanwhile) onNewer();
    }
  };
  return (
    <SelectField
      label="Starts"
      value={relation.startCondition}
      error={refusal}
      onChange={(event) => void name(event.target.value)}
      options={starts.map((value) => ({ value, label: value }))}
    />
  );
}

interface DifferenceProps {
  first: CoolingRelationView;
  second: CoolingRelationView;
  band: string;
}

function Difference({ first, second, band }: DifferenceProps) {
  const bands = sharedBands(first, second);
  if (!bands.includes(band)) {
    return (
      <p className="text-ink2">
        {second.name} has no {band}. {bands.length > 0 && `Both have ${bands.join(', ')}.`}
      </p>
    );
  }
  const tracks = differenceOf(first, second, band);
  if (tracks.length === 0) {
    return <p className="text-ink2">The two have no mass and age in common.</p>;
  }
  return (
    <>
      <TrackChart
        subject={`${band} of ${second.name} less ${first.name}`}
        ageMyr={Float64Array.from(first.ageMyr)}
        tracks={tracks}
        isDifference
      />
      <p className="text-chart text-ink3">
        Above the dashed line {second.name} is fainter, so its limits are looser. Nothing is drawn
        where one of the two does not reach.
      </p>
    </>
  );
}
