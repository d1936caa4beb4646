import type { ReactNode } from 'react';
import { JupiterMass } from '@/components/ui/notation';
import {
  formatAsymmetric,
  formatPlain,
  formatSignificant,
  THIN_SPACE,
} from '@/lib/quantities/display';
import type { AxisEstimate, CandidateDetail, MassEstimate } from '@/lib/schemas/candidates';
import { LEAST_MAGNITUDE_ERROR } from '@/lib/sensitivity/vetting';

function Interval({
  of: { median, lower, upper },
  unit,
}: {
  of: { median: number; lower: number; upper: number };
  unit: ReactNode;
}) {
  return (
    <>
      {formatAsymmetric(median, median - lower, upper - median)}
      {THIN_SPACE}
      {unit}
    </>
  );
}

function Fact({ name, value, children }: { name: string; value: ReactNode; children: string }) {
  return (
    <div>
      <dt className="text-ink3 text-note">{name}</dt>
      <dd>
        <span className="font-semibold text-value">{value}</span>
        <span className="block max-w-[56ch] text-ink2 text-note">{children}</span>
      </dd>
    </div>
  );
}

/** What the newest contrast says of the mass, in one sentence. */
export function massSentence(mass: MassEstimate): string {
  const { observedOn, band, absoluteMag, errorMag, ageMyr, cooling, solutionsMjup } = mass;
  const from = `Absolute magnitude ${absoluteMag.toFixed(2)} ± ${Math.max(errorMag, LEAST_MAGNITUDE_ERROR).toFixed(2)} in ${band} on ${observedOn}, age ${formatPlain(ageMyr)} Myr, ${cooling}`;
  if (mass.outside !== null) {
    return `${from}: ${mass.outside} than every mass of the relation, so no mass is read.`;
  }
  const solutions = solutionsMjup.map((one) => formatSignificant(one, 3));
  const parts = [
    `${from}.`,
    solutions.length > 1
      ? `Brightness does not rise with mass here: ${solutions.join(', ')} Jupiter masses all have this magnitude.`
      : '',
    mass.touchesEdge ? 'The interval ends where the relation ends.' : '',
    'Interval of 68 %, prior flat in the logarithm of mass.',
  ];
  return parts.filter((part) => part !== '').join(' ');
}

/** What the newest separation says of the axis, in one sentence. */
export function axisSentence({ observedOn, projectedSeparationAu }: AxisEstimate): string {
  return `Projected separation ${formatSignificant(projectedSeparationAu, 3)} AU on ${observedOn}, isotropic orientation and the eccentricity law of the survey's maps. Interval of 68 %, prior flat in the logarithm of the axis; the error of the separation is not in it.`;
}

/** Mass and semi-major axis as the measurements would have them; a verdict takes them or not. */
export function Estimates({ candidate }: { candidate: CandidateDetail }) {
  const { mass, axis } = candidate;
  return (
    <dl className="grid gap-4">
      <Fact
        name="mass, from its contrast, age and cooling"
        value={mass?.interval ? <Interval of={mass.interval} unit={<JupiterMass />} /> : 'none'}
      >
        {mass ? massSentence(mass) : `${candidate.massMissing}.`}
      </Fact>
      <Fact
        name="semi-major axis, from its projected separation"
        value={axis ? <Interval of={axis} unit="AU" /> : 'none'}
      >
        {axis ? axisSentence(axis) : `${candidate.axisMissing}.`}
      </Fact>
    </dl>
  );
}
