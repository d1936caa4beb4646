'use client';

import { useMemo } from 'react';
import { seriesColour } from '@/components/charts/series';
import { StarInfluenceChart } from '@/components/charts/star-influence-chart';
import { Notice } from '@/components/ui/notice';
import { SectionOpener } from '@/components/ui/section-opener';
import { SeriesKey } from '@/components/ui/series-key';
import { describeLevel } from '@/lib/inference';
import type { AnswerProps } from '../kind-entry';
import { countLeaving, groupNames, halfInWords, isStrong } from './influence-words';
import { LeftOutTable } from './left-out-table';

/** Each star against the limit without it; surveys and groups below. */
export function InfluenceAnswer({ asked, settings, result }: AnswerProps<'influence'>) {
  const { inputs, quantity } = asked;
  const stars = useMemo(() => {
    const positions = new Map(inputs.surveys.map(({ id, position }) => [id, position]));
    const surveysOf = new Map(inputs.stars.map(({ starId, surveys }) => [starId, surveys]));
    return result.stars.map(({ starId, name, probability, hosts, without }) => {
      const surveys = surveysOf.get(starId) ?? [];
      return {
        name,
        probability,
        hosts,
        limitWithout: without.limit,
        ratio: without.ratio,
        seriesIndex: surveys.length === 1 ? positions.get(surveys[0]) : undefined,
      };
    });
  }, [inputs, result]);
  const strong = result.stars.filter(({ without }) => isStrong(without.ratio));
  const groupedBy = groupNames[settings.groupBy];
  const rows = { limit: result.limit, quantity, levelLabel: describeLevel(asked.credibleLevel) };
  return (
    <>
      <div className="mb-3 flex flex-wrap items-baseline gap-x-6 gap-y-1.5">
        <p>{halfInWords(result)}</p>
        <div className="ml-auto flex flex-wrap gap-x-4 gap-y-1 max-md:ml-0">
          {inputs.surveys.map((survey) => (
            <SeriesKey key={survey.id} shape="dot" colour={seriesColour(survey.position)}>
              {survey.name}
            </SeriesKey>
          ))}
          {inputs.stars.some(({ surveys }) => surveys.length > 1) && (
            <SeriesKey shape="dot" colour="var(--ink)">
              in several, counted once
            </SeriesKey>
          )}
        </div>
      </div>
      {strong.length > 0 && (
        <div className="mb-4">
          <Notice
            tone="warn"
            title={
              strong.length === 1
                ? 'One star moves the limit by more than 20\u2009%.'
                : `${strong.length} stars each move the limit by more than 20\u2009%.`
            }
          >
            {strong.map(({ name }) => name).join(', ')}: check ages, distance and what is counted
            there before the number is quoted.
          </Notice>
        </div>
      )}
      <StarInfluenceChart
        stars={stars}
        limit={result.limit}
        halfCarriedBy={result.halfCarriedBy}
        quantity={quantity}
        levelLabel={rows.levelLabel}
      />
      <div className="mt-7 grid gap-x-12 gap-y-7 xl:grid-cols-2">
        <section className="min-w-0">
          <SectionOpener
            title="Without a survey"
            level={3}
            context="stars that another survey saw stay"
          />
          {result.surveys.length > 0 ? (
            <LeftOutTable
              {...rows}
              caption="Limit without each survey"
              head="survey"
              rows={result.surveys.map(({ id, stars: entries, ...row }) => ({
                key: id,
                ...row,
                stars: countLeaving(inputs.stars, id),
                entries,
              }))}
            />
          ) : (
            <p className="text-ink2 text-note">
              One survey: without it nothing is left to compare.
            </p>
          )}
        </section>
        <section className="min-w-0">
          <SectionOpener
            title={`Without one of the ${groupedBy}`}
            level={3}
            context="stars in none are in no row"
          />
          {result.groups.length > 0 ? (
            <LeftOutTable
              {...rows}
              caption={`Limit without each of the ${groupedBy}`}
              head={settings.groupBy === 'moving-group' ? 'group' : 'type'}
              rows={result.groups.map((row) => ({ key: row.name, ...row }))}
            />
          ) : (
            <p className="text-ink2 text-note">
              No star of this run has one in its list of targets.
            </p>
          )}
        </section>
      </div>
    </>
  );
}
