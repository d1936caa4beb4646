'use client';

import { useState } from 'react';
import { useAnalyses } from '@/components/hooks/use-analyses';
import { EmptyState } from '@/components/ui/empty-state';
import { Link } from '@/components/ui/link';
import { LinkButton } from '@/components/ui/link-button';
import { PageTitle } from '@/components/ui/page-title';
import { SectionOpener } from '@/components/ui/section-opener';
import type { AnalysisView } from '@/lib/schemas/analyses';
import { AnalysisTable } from './analysis-table';

/** More curves on one axis could not be told apart. */
const MOST_COMPARED = 6;

interface AnalysisListProps {
  collaboration: string;
  initial: AnalysisView[];
  canCreate: boolean;
}

/** All analyses as intervals on one axis; some of them can be put side by side. */
export function AnalysisList({ collaboration, initial, canCreate }: AnalysisListProps) {
  const { data: analyses = initial } = useAnalyses(collaboration, initial);
  const [picked, setPicked] = useState<string[]>([]);
  const newButton = canCreate && (
    <LinkButton href={`/${collaboration}/analyses/new`} variant="primary" icon="add">
      New analysis
    </LinkButton>
  );
  return (
    <>
      <PageTitle
        title="Analyses"
        context="A question with its settings; each run of it is kept."
        actions={analyses.length > 0 && newButton}
      />
      {analyses.length === 0 ? (
        <EmptyState title="No analysis yet" actions={newButton}>
          Choose surveys, a population and a prior; a run turns their completeness maps into a
          posterior and an upper limit that carries its conditions.
        </EmptyState>
      ) : (
        <section>
          <SectionOpener
            title="Upper limits"
            context={
              <span className="max-lg:hidden">
                bar: the limit at its level; box: central 68{'\u2009'}%
              </span>
            }
            tools={
              picked.length >= 2 && picked.length <= MOST_COMPARED ? (
                <Link
                  href={`/${collaboration}/compare?with=${picked.join()}`}
                  className="font-semibold"
                >
                  Compare {picked.join(', ')}
                </Link>
              ) : (
                <span className="text-ink3">
                  {picked.length > MOST_COMPARED
                    ? `At most ${MOST_COMPARED} can be compared`
                    : picked.length === 1
                      ? 'Tick one more to compare'
                      : 'Tick two to compare'}
                </span>
              )
            }
          />
          <AnalysisTable
            collaboration={collaboration}
            analyses={analyses}
            picked={picked}
            onPick={setPicked}
          />
        </section>
      )}
    </>
  );
}
