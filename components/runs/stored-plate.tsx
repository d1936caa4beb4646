import { useMemo } from 'react';
import { PosteriorChart } from '@/components/charts/posterior-chart';
import { HelpMark } from '@/components/help/help-mark';
import { AxisRange, MassRange } from '@/components/populations/law-notation';
import { RecordedStatementCopy } from '@/components/statement/statement-copy';
import { Conditions, conditionRow, Plate, StatementNumber } from '@/components/ui/plate';
import { countsAnything, describeLevel } from '@/lib/inference';
import { formatSignificant, THIN_SPACE } from '@/lib/quantities/display';
import type { ListedDefinition } from '@/lib/schemas/populations';
import type { DrawnInputs, DrawnResult, DrawnRun } from '@/lib/schemas/runs';
import { savedAnswer } from './limit-answer';
import { posteriorData } from './posterior-data';
import { lead } from './result-statement';
import { recipeOfRun } from './run-recipe';

interface StoredPlateProps {
  collaboration: string;
  run: DrawnRun;
  definition: ListedDefinition;
  inputs: DrawnInputs;
  result: DrawnResult;
}

/** The recorded statement beside its posterior. */
export function StoredPlate({ collaboration, run, definition, result }: StoredPlateProps) {
  const { answer, quantity, credibleLevel, statement, counted } = result;
  const isFraction = quantity === 'host_fraction';
  const prior = recipeOfRun(run)?.prior;
  const posterior = useMemo(
    () =>
      prior &&
      posteriorData({
        setting: { prior, credibleLevel },
        quantity,
        answer: savedAnswer(answer),
        zero: counted.length > 0 ? savedAnswer(result.zero) : undefined,
        hasInterval: countsAnything(counted, result.candidates),
      }),
    [prior, credibleLevel, quantity, answer, counted, result],
  );
  return (
    <Plate className="grid gap-x-[26px] gap-y-6 xl:grid-cols-[440px_1fr]">
      <div className="min-w-0">
        <p className="text-body text-ink3">
          <span className="mr-[9px]">1</span>
          {answer.isConstrained
            ? `Upper limit, ${describeLevel(credibleLevel)} credible level`
            : 'No limit'}
          <HelpMark word="upper-limit" />
        </p>
        {answer.isConstrained && (
          <StatementNumber
            value={formatSignificant(100 * answer.limit, 2)}
            unit={isFraction ? `${THIN_SPACE}%` : undefined}
          />
        )}
        <p className="statement mb-5">
          {lead(answer.isConstrained, isFraction)} <MassRange definition={definition} />
          {' at '}
          <AxisRange definition={definition} />
          {answer.isConstrained && !isFraction && ' per 100 stars'}
        </p>
        <Conditions rows={statement.conditions.map(conditionRow)} />
        <div className="mt-2 -ml-1">
          <RecordedStatementCopy collaboration={collaboration} runId={run.id} />
        </div>
      </div>
      {posterior && <PosteriorChart {...posterior} />}
    </Plate>
  );
}
