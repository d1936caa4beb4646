'use client';

import { type ReactNode, useState } from 'react';
import type { z } from 'zod';
import { useAction } from '@/components/hooks/use-action';
import { giveVerdict } from '@/components/hooks/use-candidates';
import { Button } from '@/components/ui/button';
import { JupiterMass } from '@/components/ui/notation';
import { Notice } from '@/components/ui/notice';
import { NumberField } from '@/components/ui/number-field';
import { SelectField } from '@/components/ui/select-field';
import { TextAreaField } from '@/components/ui/text-area-field';
import type { CandidateDetail, CompanionStatus, giveVerdictSchema } from '@/lib/schemas/candidates';
import { numberOf } from './form-values';
import { readStatus, statuses, statusWords } from './status-words';

type VerdictInput = z.input<typeof giveVerdictSchema>;

interface VerdictFormProps {
  collaboration: string;
  candidate: CandidateDetail;
  onGiven(candidate: CandidateDetail): void;
}

function choiceOf<Measured extends string>(form: FormData, name: string, measured: Measured) {
  const from = String(form.get(`${name}From`));
  if (from === 'kept') return { from: 'kept' as const };
  if (from === measured) return { from: measured };
  return {
    from: 'given' as const,
    value: numberOf(form, name) ?? Number.NaN,
    errorLower: numberOf(form, `${name}Lower`) ?? 0,
    errorUpper: numberOf(form, `${name}Upper`) ?? 0,
  };
}

/** What the fields say, as the server takes it. */
export function readVerdict(form: FormData, isProposal: boolean): VerdictInput {
  const status = readStatus(form.get('status'));
  if (status === undefined) throw new RangeError('No status is chosen');
  return {
    status,
    probability: numberOf(form, 'probability'),
    mass: choiceOf(form, 'mass', 'photometry'),
    semiMajorAxis: choiceOf(form, 'axis', 'separation'),
    reason: String(form.get('reason') ?? ''),
    isProposal,
  };
}

interface ValueChoiceProps {
  name: string;
  title: string;
  unit: ReactNode;
  kept: string;
  measured: { value: string; label: string; isThere: boolean };
}

function ValueChoice({ name, title, unit, kept, measured }: ValueChoiceProps) {
  const [from, setFrom] = useState('kept');
  return (
    <div className="grid gap-3">
      <SelectField
        label={title}
        name={`${name}From`}
        value={from}
        onChange={(event) => setFrom(event.target.value)}
        options={[
          { value: 'kept', label: kept },
          { value: measured.value, label: measured.label, isDisabled: !measured.isThere },
          { value: 'given', label: 'given here' },
        ]}
      />
      {from === 'given' && (
        <div className="grid gap-3 sm:grid-cols-3">
          <NumberField label="Value" name={name} unit={unit} min={0} required />
          <NumberField label="Lower error" name={`${name}Lower`} unit={unit} min={0} required />
          <NumberField label="Upper error" name={`${name}Upper`} unit={unit} min={0} required />
        </div>
      )}
    </div>
  );
}

/** Decides, with a reason; whoever may not decide sends the same as a proposal. */
export function VerdictForm({ collaboration, candidate, onGiven }: VerdictFormProps) {
  const [status, setStatus] = useState<CompanionStatus>(candidate.status);
  const { perform, isBusy, problem } = useAction();
  const isProposal = !candidate.can.vet;
  const isOpenStatus = status === 'candidate' || status === 'ambiguous';
  const submit = (element: HTMLFormElement) =>
    perform(async () => {
      const body = readVerdict(new FormData(element), isProposal);
      onGiven(await giveVerdict(collaboration, candidate.id, body));
      const reason = element.elements.namedItem('reason');
      if (reason instanceof HTMLTextAreaElement) reason.value = '';
    });
  return (
    <form
      className="grid gap-4"
      onSubmit={(event) => {
        event.preventDefault();
        void submit(event.currentTarget);
      }}
    >
      {isProposal && (
        <p className="text-ink2 text-note">
          The lead of {candidate.survey.name} or an owner decides. What you send here stands in the
          history as a proposal and changes nothing.
        </p>
      )}
      <div className="grid gap-3 sm:grid-cols-2">
        <SelectField
          label="It is"
          name="status"
          value={status}
          onChange={(event) => setStatus(readStatus(event.target.value) ?? status)}
          options={statuses.map((value) => ({
            value,
            label: statusWords[value],
          }))}
        />
        {isOpenStatus && (
          <NumberField
            label="Probability of being bound"
            name="probability"
            min={0}
            max={1}
            defaultValue={candidate.isOpen ? (candidate.probability ?? '') : ''}
            hint="0 to 1; limits that count candidates need it"
          />
        )}
      </div>
      <ValueChoice
        name="mass"
        title="Mass"
        unit={<JupiterMass />}
        kept={candidate.massMjup === null ? 'none' : 'as it is'}
        measured={{
          value: 'photometry',
          label: 'from photometry',
          isThere: candidate.mass?.interval != null,
        }}
      />
      <ValueChoice
        name="axis"
        title="Semi-major axis"
        unit="AU"
        kept={candidate.semiMajorAxisAu === null ? 'none' : 'as it is'}
        measured={{
          value: 'separation',
          label: 'from the projected separation',
          isThere: candidate.axis !== null,
        }}
      />
      <TextAreaField label="Reason" name="reason" required maxLength={2000} rows={4} />
      {problem !== undefined && <Notice tone="bad" title={problem} isAnnounced />}
      <div>
        <Button type="submit" variant="primary" isBusy={isBusy}>
          {isProposal ? 'Send the proposal' : 'Give the verdict'}
        </Button>
      </div>
    </form>
  );
}
