'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { EmptyState } from '@/components/ui/empty-state';
import { LinkButton } from '@/components/ui/link-button';
import { Notice } from '@/components/ui/notice';
import { PageTitle } from '@/components/ui/page-title';
import { SelectField } from '@/components/ui/select-field';
import { type AnalysisView, analysisRecipeSchema } from '@/lib/schemas/analyses';
import type { ListedPopulation } from '@/lib/schemas/populations';
import type { RunView } from '@/lib/schemas/runs';
import { type ComparedInput, type ComparedRun, compareInputs } from './compare-differences';
import { ComparePlate } from './compare-plate';
import { ByLevel, ComparisonInWords, Differences } from './compare-sections';
import { compareSentences } from './compare-words';
import { inWords } from './name-words';

interface CompareScreenProps {
  collaboration: string;
  /** Analyses with a finished run. */
  choices: { key: string; name: string }[];
  sides: {
    key: string;
    analysis: AnalysisView | null;
    run: RunView | null;
    population: ListedPopulation | null;
  }[];
}

/** Two analyses on one axis: both limits, and what differs between them. */
export function CompareScreen({ collaboration, choices, sides }: CompareScreenProps) {
  const compared = sides.map(asCompared);
  const [a, b] = compared;
  return (
    <>
      <PageTitle
        title={a && b ? titleOf(a, b) : 'Comparison'}
        crumbs={[
          { href: `/${collaboration}/analyses`, label: 'Analyses' },
          { label: 'Comparison' },
        ]}
        actions={a && b && <Tools collaboration={collaboration} a={a.key} b={b.key} />}
      />
      {a && b ? (
        <Comparison collaboration={collaboration} a={a} b={b} />
      ) : (
        <ChooseTwo collaboration={collaboration} choices={choices} sides={sides} />
      )}
    </>
  );
}

function asCompared(side: CompareScreenProps['sides'][number]): ComparedRun | undefined {
  const { key, analysis, run, population } = side;
  const recipe = analysisRecipeSchema.safeParse(run?.recipe);
  if (!analysis || !run?.inputs || !run.result || !population || !recipe.success) return undefined;
  return {
    key,
    name: analysis.name,
    run,
    inputs: run.inputs,
    result: run.result,
    recipe: recipe.data,
    definition: population.definition,
  };
}

function titleOf(a: ComparedRun, b: ComparedRun): string {
  const [first, second] = [a.result.counted.length, b.result.counted.length];
  if (first > 0 && second === 0 && b.recipe.detections === 'none') {
    return `With ${inWords(first)} detection${first === 1 ? '' : 's'} and with none`;
  }
  return `${a.key} and ${b.key}`;
}

function Tools({ collaboration, a, b }: { collaboration: string; a: string; b: string }) {
  const [isCopied, setCopied] = useState(false);
  return (
    <>
      <LinkButton href={`/${collaboration}/compare?with=${b},${a}`} icon="compare">
        Swap A and B
      </LinkButton>
      <Button
        icon="link"
        onClick={async () => {
          await navigator.clipboard.writeText(window.location.href);
          setCopied(true);
        }}
      >
        <span aria-live="polite">{isCopied ? 'Link copied' : 'Copy link'}</span>
      </Button>
    </>
  );
}

function Comparison({
  collaboration,
  a,
  b,
}: {
  collaboration: string;
  a: ComparedRun;
  b: ComparedRun;
}) {
  const inputs = compareInputs(a, b);
  const differing = inputs.filter((row) => row.a !== row.b);
  const otherQuestion = differing.filter((row) => row.changesQuestion);
  const words = compareSentences(a, b, differing);
  return (
    <>
      <ComparePlate collaboration={collaboration} a={a} b={b} inputs={inputs} />
      {otherQuestion.length > 0 && (
        <div className="mt-4">
          <Notice
            tone="warn"
            title={`The two limits answer different questions: ${otherQuestion.map(({ name }) => name.toLowerCase()).join(', ')} ${otherQuestion.length === 1 ? 'differs' : 'differ'}.`}
            actions={
              alignQuery(a, otherQuestion) && (
                <LinkButton
                  size="small"
                  href={`/${collaboration}/analyses/${b.key}?${alignQuery(a, otherQuestion)}`}
                >
                  Set B as A
                </LinkButton>
              )
            }
          >
            Compare them only after aligning.
          </Notice>
        </div>
      )}
      <div className="mt-8 grid gap-x-14 gap-y-8 pb-10 xl:grid-cols-[1fr_360px]">
        <div className="grid min-w-0 content-start gap-8">
          <Differences inputs={inputs} differing={differing} />
          <ComparisonInWords text={words} />
        </div>
        <ByLevel a={a} b={b} />
      </div>
    </>
  );
}

/** The live setting that would ask B the question of A. */
function alignQuery(a: ComparedRun, rows: ComparedInput[]): string {
  const { definition, result } = a;
  const parts: Record<string, string> = {};
  for (const { name } of rows) {
    if (name === 'Planet mass' && definition.form !== 'mass-ratio') {
      parts.mass = `${definition.massMinMjup}-${definition.massMaxMjup}`;
    }
    if (name === 'Semi-major axis') {
      parts.axis = `${definition.semiMajorAxisMinAu}-${definition.semiMajorAxisMaxAu}`;
    }
    if (name === 'Level') parts.level = String(result.credibleLevel);
  }
  return new URLSearchParams(parts).toString();
}

function ChooseTwo({ collaboration, choices, sides }: CompareScreenProps) {
  const router = useRouter();
  const [keys, setKeys] = useState<[string, string]>(() => {
    const first = choices.find(({ key }) => key === sides[0]?.key) ?? choices[0];
    const second =
      choices.find(({ key }) => key === sides[1]?.key && key !== first?.key) ??
      choices.find(({ key }) => key !== first?.key);
    return [first?.key ?? '', second?.key ?? ''];
  });
  const unfinished = sides.filter(({ run }) => run === null);
  if (choices.length < 2) {
    return (
      <EmptyState
        title="Two finished analyses are needed"
        actions={
          <LinkButton href={`/${collaboration}/analyses`} variant="primary">
            To the analyses
          </LinkButton>
        }
      >
        {choices.length === 0
          ? 'No analysis has a finished run yet.'
          : `Only ${choices[0].key} has a finished run. Copy it, change the copy and run it: then the two stand here on one axis.`}
      </EmptyState>
    );
  }
  const select = (side: 0 | 1, label: string) => (
    <SelectField
      label={label}
      value={keys[side]}
      onChange={(event) =>
        setKeys(side === 0 ? [event.target.value, keys[1]] : [keys[0], event.target.value])
      }
      options={choices.map(({ key, name }) => ({ value: key, label: `${key}: ${name}` }))}
    />
  );
  return (
    <div className="grid max-w-[640px] gap-4">
      {unfinished.length > 0 && (
        <Notice tone="warn" title={`${unfinished.map(({ key }) => key).join(' and ')}:`}>
          no finished run to compare, or no such analysis.
        </Notice>
      )}
      {select(0, 'A')}
      {select(1, 'B')}
      <div>
        <Button
          variant="primary"
          icon="compare"
          disabledReason={keys[0] === keys[1] ? 'Choose two different analyses.' : undefined}
          onClick={() => router.push(`/${collaboration}/compare?with=${keys.join()}`)}
        >
          Compare
        </Button>
      </div>
    </div>
  );
}
