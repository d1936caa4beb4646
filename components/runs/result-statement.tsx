import type { ReactNode } from 'react';
import { HelpMark } from '@/components/help/help-mark';
import { AxisRange, MassRange, PowerLaws } from '@/components/populations/law-notation';
import { JupiterMass } from '@/components/ui/notation';
import { type ConditionRow, Conditions, LiveMark, StatementNumber } from '@/components/ui/plate';
import {
  describeBackground,
  describeCandidates,
  describeLevel,
  describePrior,
  type RateQuantity,
  type StatedCandidates,
} from '@/lib/inference';
import { formatPercent, formatRate, formatSignificant, THIN_SPACE } from '@/lib/quantities/display';
import type { PowerLawDefinition } from '@/lib/schemas/populations';
import { EditableRange } from './editable-range';
import type { LimitAnswer } from './limit-answer';
import type { LiveSetting } from './live-setting';

interface ResultStatementProps {
  setting: LiveSetting;
  quantity: RateQuantity;
  answer: LimitAnswer;
  /** "live" where the number follows a control, "run 18" where it does not follow the setting. */
  mark?: string;
  /** Ends of the maps. */
  bounds: { mass: [number, number]; axis: [number, number] };
  conditions: ConditionRow[];
  /** Read out when the number has been still for a while. */
  announced: string;
  /** Takes the statement along. */
  copy?: ReactNode;
  onDefinition(definition: PowerLawDefinition): void;
}

/** The sentence that a result is read as, with everything that it rests on below. */
export function ResultStatement(props: ResultStatementProps) {
  const { setting, quantity, answer, mark, conditions, announced } = props;
  const isFraction = quantity === 'host_fraction';
  return (
    <div className="min-w-0">
      <p className="text-body text-ink3">
        <span className="mr-[9px]">1</span>
        {answer.isConstrained
          ? `Upper limit, ${describeLevel(setting.credibleLevel)} credible level`
          : 'No limit'}
        <HelpMark word="upper-limit" />
        {mark === 'live' ? (
          <LiveMark />
        ) : (
          mark !== undefined && <span className="ml-2">{mark}</span>
        )}
      </p>
      {answer.isConstrained && (
        <StatementNumber
          value={formatSignificant(100 * answer.limit, 2)}
          unit={isFraction ? `${THIN_SPACE}%` : undefined}
        />
      )}
      <p className="statement mb-5" aria-live="off">
        {lead(answer.isConstrained, isFraction)} <Ranges {...props} />
        {answer.isConstrained && !isFraction && ' per 100 stars'}
      </p>
      <p className="sr-only" aria-live="polite">
        {announced}
      </p>
      <Conditions rows={conditions} />
      {props.copy !== undefined && <div className="mt-2 -ml-1">{props.copy}</div>}
    </div>
  );
}

/** How the sentence under the number begins. */
export function lead(isConstrained: boolean, isFraction: boolean): string {
  if (!isConstrained) return 'These data do not constrain planets of';
  return isFraction ? 'of stars host at least one planet of' : 'planets of';
}

function Ranges({ setting, bounds, onDefinition }: ResultStatementProps) {
  const { definition } = setting;
  return (
    <>
      <EditableRange
        name="planet mass"
        unit="Jupiter masses"
        mark={<JupiterMass />}
        min={definition.massMinMjup}
        max={definition.massMaxMjup}
        bounds={bounds.mass}
        onChange={(massMinMjup, massMaxMjup) =>
          onDefinition({ ...definition, massMinMjup, massMaxMjup })
        }
      >
        <MassRange definition={definition} />
      </EditableRange>
      {' at '}
      <EditableRange
        name="semi-major axis"
        unit="AU"
        mark="AU"
        min={definition.semiMajorAxisMinAu}
        max={definition.semiMajorAxisMaxAu}
        bounds={bounds.axis}
        onChange={(semiMajorAxisMinAu, semiMajorAxisMaxAu) =>
          onDefinition({ ...definition, semiMajorAxisMinAu, semiMajorAxisMaxAu })
        }
      >
        <AxisRange definition={definition} />
      </EditableRange>
    </>
  );
}

interface ConditionInputs {
  setting: LiveSetting;
  quantity: RateQuantity;
  stars: number;
  counted: string[];
  candidates: StatedCandidates | undefined;
  outside: string[];
  merged: string[];
  cooling: string;
  /** What is done with them, where they are not the run's. */
  ages: string | null;
  shareOutsideMaps: number;
  answer: LimitAnswer;
  atTenthOfFloor: number | null;
}

/** Name and value, line by line, from the setting and never from a stored text. */
export function conditionRows(inputs: ConditionInputs): ConditionRow[] {
  const { setting, quantity, stars, answer, atTenthOfFloor, shareOutsideMaps } = inputs;
  const rows: ConditionRow[] = [
    { name: 'Prior', help: 'prior', value: describePrior(setting.prior, quantity) },
    {
      name: 'Population',
      help: 'population',
      value: <PowerLaws definition={setting.definition} />,
    },
    {
      name: 'Likelihood',
      help: 'likelihood',
      value:
        quantity === 'host_fraction'
          ? `host fraction, binomial over ${stars} stars`
          : `mean number of planets, Poisson over ${stars} stars`,
    },
    { name: 'Detections', help: 'detection', value: detectionWords(inputs) },
  ];
  if (inputs.candidates) {
    rows.push({
      name: 'Candidates',
      help: 'undecided-candidates',
      value: describeCandidates(inputs.candidates),
    });
  }
  if (setting.background !== undefined) {
    rows.push({
      name: 'Background',
      help: 'false-detections',
      value: describeBackground(setting.background),
    });
  }
  rows.push({ name: 'Cooling', help: 'cooling-model', value: inputs.cooling });
  if (inputs.ages) rows.push({ name: 'Ages', help: 'age-shift', value: inputs.ages });
  if (shareOutsideMaps > 0.0005) {
    rows.push({
      name: 'Outside',
      help: 'share-outside',
      value: `${formatPercent(shareOutsideMaps)} of the population lies beyond the maps and counts as never seen`,
    });
  }
  if (atTenthOfFloor !== null) {
    rows.push({
      name: 'Floor',
      help: 'log-uniform-prior',
      value: `at a tenth of it the limit would be <${formatRate(atTenthOfFloor, quantity)}`,
    });
  }
  if (answer.isConstrained && answer.isSetByPrior) {
    rows.push({
      name: 'Note',
      help: 'set-by-the-prior',
      value: 'the limit is set by the prior, not by the data',
    });
  }
  return rows;
}

function detectionWords({ setting, counted, outside, merged }: ConditionInputs): string {
  const parts = [];
  if (setting.detections === 'none') parts.push('none counted: set aside');
  else if (counted.length === 0) parts.push('none inside the ranges');
  else {
    parts.push(`${counted.length} vetted, inside the ranges: ${counted.join(', ')}`);
  }
  if (merged.length > 0) parts.push(`${merged.join(', ')} shares its star and counts once`);
  if (outside.length > 0) parts.push(`${outside.length} outside`);
  return parts.join('; ');
}
