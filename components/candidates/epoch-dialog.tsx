'use client';

import { useAction } from '@/components/hooks/use-action';
import { addObservation } from '@/components/hooks/use-candidates';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Notice } from '@/components/ui/notice';
import { NumberField } from '@/components/ui/number-field';
import { TextField } from '@/components/ui/text-field';
import type { CandidateDetail } from '@/lib/schemas/candidates';
import { numberOf, textOf } from './form-values';

interface EpochDialogProps {
  collaboration: string;
  candidate: CandidateDetail;
  isOpen: boolean;
  onClose(): void;
  onSaved(candidate: CandidateDetail): void;
}

const readEpoch = (form: FormData) => ({
  observedOn: String(form.get('observedOn')),
  separationArcsec: numberOf(form, 'separation') ?? Number.NaN,
  separationErrorArcsec: numberOf(form, 'separationError') ?? Number.NaN,
  positionAngleDeg: numberOf(form, 'positionAngle') ?? Number.NaN,
  positionAngleErrorDeg: numberOf(form, 'positionAngleError') ?? Number.NaN,
  band: textOf(form, 'band'),
  contrastMag: numberOf(form, 'contrast'),
  contrastErrorMag: numberOf(form, 'contrastError'),
  source: textOf(form, 'source'),
});

/** One more day on which the candidate was seen. */
export function EpochDialog(props: EpochDialogProps) {
  const { collaboration, candidate, isOpen, onClose, onSaved } = props;
  const { perform, isBusy, problem } = useAction();
  const submit = (form: FormData) =>
    perform(async () => {
      onSaved(await addObservation(collaboration, candidate.id, readEpoch(form)));
      onClose();
    });
  return (
    <Dialog isOpen={isOpen} onClose={onClose} title={`An epoch of ${candidate.name}`}>
      <form
        className="grid gap-3 sm:grid-cols-2"
        onSubmit={(event) => {
          event.preventDefault();
          void submit(new FormData(event.currentTarget));
        }}
      >
        <TextField label="Day" name="observedOn" type="date" required />
        <TextField label="Source" name="source" hint="Instrument, reduction or paper" />
        <NumberField label="Separation" name="separation" unit="arcsec" min={0} required />
        <NumberField label="Its error, 1 σ" name="separationError" unit="arcsec" min={0} required />
        <NumberField
          label="Position angle"
          name="positionAngle"
          unit="deg"
          min={0}
          max={360}
          required
        />
        <NumberField label="Its error, 1 σ" name="positionAngleError" unit="deg" min={0} required />
        <NumberField label="Contrast" name="contrast" unit="mag" min={0} />
        <NumberField label="Its error, 1 σ" name="contrastError" unit="mag" min={0} />
        <TextField label="Band of the contrast" name="band" maxLength={20} />
        <div className="grid gap-3 sm:col-span-2">
          {problem !== undefined && <Notice tone="bad" title={problem} isAnnounced />}
          <div className="flex gap-2">
            <Button type="submit" variant="primary" isBusy={isBusy}>
              Add the epoch
            </Button>
            <Button onClick={onClose}>Cancel</Button>
          </div>
        </div>
      </form>
    </Dialog>
  );
}
