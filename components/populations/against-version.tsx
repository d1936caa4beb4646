'use client';

import { useMemo, useState } from 'react';
import { percentBelow } from '@/components/runs/level-table';
import type { LiveSample } from '@/components/runs/live-sample';
import { SectionOpener } from '@/components/ui/section-opener';
import { SelectField } from '@/components/ui/select-field';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { type Population, summariseSystems } from '@/lib/population';
import type { ListedPopulation } from '@/lib/schemas/populations';
import type { Conventions, PreviewSetting } from './builder-setting';
import { previewAnswer } from './preview-figures';
import { useWholeDefinition } from './use-whole-definition';
import { changesBetween } from './version-changes';

interface AgainstVersionProps {
  collaboration: string;
  /** All versions, newest first. */
  versions: ListedPopulation[];
  /** The version on the screen, with which the comparison begins unless it is unchanged. */
  shown: ListedPopulation;
  isChanged: boolean;
  /** What is compared with it: the controls as they stand. */
  now: Population;
  conventions: Conventions;
  setting: PreviewSetting;
  /** Undefined without maps: then the inputs alone are compared. */
  sample?: LiveSample;
}

/** Each part that differs from a version, in input and in limit. */
export function AgainstVersion(props: AgainstVersionProps) {
  const { collaboration, versions, shown, isChanged, now, conventions, setting, sample } = props;
  const earlier = versions.find(({ version }) => version < shown.version);
  const others = isChanged ? versions : versions.filter(({ id }) => id !== shown.id);
  const [chosenId, setChosen] = useState<string>();
  const base =
    others.find(({ id }) => id === chosenId) ?? (isChanged ? shown : (earlier ?? others[0]));
  const { definition: before } = useWholeDefinition(collaboration, base);
  const { prior, credibleLevel } = setting;
  const changes = useMemo(() => {
    const listed = now.form === 'systems' ? summariseSystems(now) : now;
    return base ? changesBetween(base.definition, listed, conventions) : [];
  }, [base, now, conventions]);
  const limits = useMemo(() => {
    if (!sample || !before || changes.length === 0) return undefined;
    const limit = (definition: Population) =>
      previewAnswer(sample, { definition, prior, credibleLevel })?.withDetections?.limit ?? null;
    return {
      before: limit(before),
      now: limit(now),
      each: changes.map(({ alone }) => (alone === null ? null : limit(alone))),
    };
  }, [sample, before, now, changes, prior, credibleLevel]);
  if (!base) {
    return (
      <section className="min-w-0">
        <SectionOpener title="Against a version" />
        <p className="text-ink2 text-note">
          Version {shown.version} is the only one and nothing is changed. {usedWords(shown)} Saving
          makes a new version; nothing already run changes.
        </p>
      </section>
    );
  }
  const nowWords = isChanged ? 'now' : `version ${shown.version}`;
  return (
    <section className="min-w-0">
      <SectionOpener title={`Against version ${base.version}`} />
      {others.length > 1 && (
        <div className="mb-3 max-w-60">
          <SelectField
            label="Compare with"
            value={base.id}
            onChange={(event) => setChosen(event.target.value)}
            options={others.map(({ id, version, note }) => ({
              value: id,
              label: `version ${version}${note === '' ? '' : `: ${note.slice(0, 40)}`}`,
            }))}
          />
        </div>
      )}
      {changes.length === 0 ? (
        <p className="text-ink2 text-note">Nothing differs from version {base.version}.</p>
      ) : (
        <Table caption={`What differs from version ${base.version}`}>
          <TableHead>
            <tr>
              <HeadCell>part</HeadCell>
              <HeadCell isNumeric>version {base.version}</HeadCell>
              <HeadCell isNumeric>{nowWords}</HeadCell>
              {limits && <HeadCell isNumeric>limit, %</HeadCell>}
            </tr>
          </TableHead>
          <TableBody>
            {changes.map((change, index) => (
              <Row key={change.name}>
                <Cell>{change.name}</Cell>
                <Cell isNumeric>{change.before}</Cell>
                <Cell isNumeric className="font-semibold">
                  {change.now}
                </Cell>
                {limits && (
                  <Cell isNumeric>
                    {change.alone !== null && (
                      <span className="whitespace-nowrap">
                        {percentBelow(limits.before)}{' '}
                        <span className="limit">{percentBelow(limits.each[index])}</span>
                      </span>
                    )}
                  </Cell>
                )}
              </Row>
            ))}
            {limits && (changes.length > 1 || changes[0].alone === null) && (
              <Row isTotal>
                <Cell colSpan={3}>all together</Cell>
                <Cell isNumeric>
                  <span className="whitespace-nowrap">
                    {percentBelow(limits.before)}{' '}
                    <span className="limit">{percentBelow(limits.now)}</span>
                  </span>
                </Cell>
              </Row>
            )}
          </TableBody>
        </Table>
      )}
      <p className="mt-3 text-ink2 text-note">
        {usedWords(base)} Saving makes a new version; nothing already run changes.
      </p>
    </section>
  );
}

function usedWords({ usedBy, version }: ListedPopulation): string {
  if (usedBy.length === 0) return `No analysis uses version ${version}.`;
  return usedBy.length === 1
    ? `${usedBy[0]} uses version ${version} and keeps it.`
    : `${usedBy.join(', ')} use version ${version} and keep it.`;
}
