'use client';

import { useMemo } from 'react';
import { percentBelow } from '@/components/runs/level-table';
import type { LiveSample } from '@/components/runs/live-sample';
import { SectionOpener } from '@/components/ui/section-opener';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { formatRange } from '@/lib/quantities/display';
import type { PowerLawDefinition } from '@/lib/schemas/populations';
import type { BuilderSetting } from './builder-setting';
import { quoteIndex } from './law-notation';
import { previewAnswer } from './preview-figures';

interface Change {
  name: string;
  before: string;
  now: string;
  /** The version with this change alone. */
  alone: PowerLawDefinition;
}

/** Each part that differs from a version, in input and in limit. */
export function AgainstVersion({
  version,
  before,
  usedBy,
  setting,
  sample,
}: {
  version: number;
  /** The definition of that version. */
  before: PowerLawDefinition;
  /** Analyses that rest on it. */
  usedBy: string[];
  setting: BuilderSetting;
  /** Undefined without maps: then the inputs alone are compared. */
  sample?: LiveSample;
}) {
  const { definition, convention, prior, credibleLevel } = setting;
  const changes = changesOf(before, definition, convention);
  const alone = JSON.stringify(changes.map((change) => change.alone));
  const limits = useMemo(() => {
    if (!sample) return undefined;
    const limit = (of: PowerLawDefinition) =>
      previewAnswer(sample, { definition: of, prior, credibleLevel })?.withDetections?.limit ??
      null;
    return {
      before: limit(before),
      now: limit(definition),
      each: (JSON.parse(alone) as PowerLawDefinition[]).map(limit),
    };
  }, [sample, before, definition, prior, credibleLevel, alone]);

  return (
    <section className="min-w-0">
      <SectionOpener title={`Against version ${version}`} />
      {changes.length === 0 ? (
        <p className="text-ink2 text-note">Nothing differs from version {version}.</p>
      ) : (
        <Table caption={`What differs from version ${version}`}>
          <TableHead>
            <tr>
              <HeadCell>part</HeadCell>
              <HeadCell isNumeric>version {version}</HeadCell>
              <HeadCell isNumeric>now</HeadCell>
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
                    {percentBelow(limits.before)}{' '}
                    <span className="limit">{percentBelow(limits.each[index])}</span>
                  </Cell>
                )}
              </Row>
            ))}
            {limits && changes.length > 1 && (
              <Row isTotal>
                <Cell colSpan={3}>all together</Cell>
                <Cell isNumeric>
                  {percentBelow(limits.before)}{' '}
                  <span className="limit">{percentBelow(limits.now)}</span>
                </Cell>
              </Row>
            )}
          </TableBody>
        </Table>
      )}
      <p className="mt-3 text-ink2 text-note">
        {usedBy.length === 0
          ? `No analysis uses version ${version}.`
          : `${usedBy.join(', ')} ${usedBy.length === 1 ? 'uses' : 'use'} version ${version} and keep${usedBy.length === 1 ? 's' : ''} it.`}{' '}
        Saving makes a new version; nothing already run changes.
      </p>
    </section>
  );
}

function changesOf(
  before: PowerLawDefinition,
  now: PowerLawDefinition,
  convention: BuilderSetting['convention'],
): Change[] {
  const changes: Change[] = [];
  const add = (
    name: string,
    show: (d: PowerLawDefinition) => string,
    part: (keyof PowerLawDefinition)[],
  ) => {
    if (part.every((field) => before[field] === now[field])) return;
    const alone = { ...before, ...Object.fromEntries(part.map((field) => [field, now[field]])) };
    changes.push({ name, before: show(before), now: show(now), alone });
  };
  add('mass range', (d) => formatRange(d.massMinMjup, d.massMaxMjup, 'MJ'), [
    'massMinMjup',
    'massMaxMjup',
  ]);
  add('index α', (d) => quoteIndex(d.massIndex, convention), ['massIndex']);
  add('axis range', (d) => formatRange(d.semiMajorAxisMinAu, d.semiMajorAxisMaxAu, 'AU'), [
    'semiMajorAxisMinAu',
    'semiMajorAxisMaxAu',
  ]);
  add('index β', (d) => quoteIndex(d.semiMajorAxisIndex, convention), ['semiMajorAxisIndex']);
  return changes;
}
