'use client';

import { FigureFrame } from '@/components/figures/figure-frame';
import { CalibrationCheck } from '@/components/studies/calibration/calibration-check';
import { FurtherQuestions } from '@/components/studies/further-questions';
import { Notice } from '@/components/ui/notice';
import { PageTitle } from '@/components/ui/page-title';
import type { AnalysisView } from '@/lib/schemas/analyses';
import type { ListedDefinition } from '@/lib/schemas/populations';
import type { DrawnInputs, DrawnResult, DrawnRun } from '@/lib/schemas/runs';
import { AnalysisState } from './analysis-state';
import { ChecksStrip } from './checks-strip';
import { NoRunPlate } from './no-run-plate';
import { ProvenanceSection } from './provenance';
import { KeptActions } from './result-actions';
import { recordedFigures } from './run-figures';
import { RunNotices } from './run-notices';
import { isFinished, isOnItsWay } from './run-standing';
import { storedCandidates } from './shown-result';
import { StoredPlate } from './stored-plate';
import { StoredSections } from './stored-sections';
import { useStoredMap } from './use-map-figures';

interface StoredResultProps {
  collaboration: string;
  analysis: AnalysisView;
  /** Newest finished run, with its result. */
  run: DrawnRun | null;
  /** The population of that run. */
  definition: ListedDefinition;
  onChanged(): void;
}

/** A result as it is stored, where no control of the page can follow the law of its population. */
export function StoredResult(props: StoredResultProps) {
  const { collaboration, analysis, run, definition, onChanged } = props;
  const finished = analysis.runs.find(isFinished);
  const isBusy = isOnItsWay(analysis.runs[0]);
  return (
    <>
      <PageTitle
        title={analysis.name}
        crumbs={[
          { href: `/${collaboration}/analyses`, label: 'Analyses' },
          { label: analysis.key },
        ]}
        state={<AnalysisState run={finished} {...{ collaboration, analysis, onChanged }} />}
        actions={
          <KeptActions
            placement="head"
            run={finished}
            onSaved={onChanged}
            {...{ collaboration, analysis, isBusy }}
          />
        }
      />
      <RunNotices needsRun run={finished} {...{ collaboration, analysis, onChanged }} />
      {run?.result && run.inputs ? (
        <StoredBody
          {...{ collaboration, run, definition }}
          inputs={run.inputs}
          result={run.result}
        />
      ) : (
        <NoRunPlate
          collaboration={collaboration}
          analysis={analysis}
          isOnItsWay={isBusy}
          onChanged={onChanged}
        />
      )}
    </>
  );
}

interface StoredBodyProps {
  collaboration: string;
  run: DrawnRun;
  definition: ListedDefinition;
  inputs: DrawnInputs;
  result: DrawnResult;
}

function StoredBody({ collaboration, run, definition, inputs, result }: StoredBodyProps) {
  const { map } = useStoredMap(result, inputs);
  return (
    <FigureFrame collaboration={collaboration} {...recordedFigures(run, inputs, result)}>
      <StoredPlate {...{ collaboration, run, definition, inputs, result }} />
      <div className="mt-2.5">
        <Notice tone="neutral" title="Recorded, without live controls.">
          The controls of an analysis know single power laws. This population has another law: a
          change of it is a new version of the population and a new run.
        </Notice>
      </div>
      <ChecksStrip
        inputs={inputs}
        map={map}
        definition={definition}
        shareOutsideMaps={result.shareOutsideMaps}
        shareFlaggedCooling={result.shareFlaggedCooling}
        candidates={storedCandidates(inputs, result)}
        calibration={
          <CalibrationCheck
            collaboration={collaboration}
            analysisKey={run.analysis.key}
            runId={run.id}
          />
        }
      />
      <StoredSections {...{ collaboration, run, definition, inputs, result }} />
      <div className="pb-10 md:mt-8">
        <ProvenanceSection {...{ collaboration, run, result }} />
        <div className="md:mt-8">
          <FurtherQuestions
            number={7}
            collaboration={collaboration}
            analysisKey={run.analysis.key}
            runId={run.id}
          />
        </div>
      </div>
    </FigureFrame>
  );
}
