'use client';

import { TextField } from '@/components/ui/text-field';
import type { UploadSettings } from '@/lib/schemas/uploads';

type Axis = 'mass' | 'semiMajorAxis';

const axes: { axis: Axis; label: string; example: string }[] = [
  { axis: 'mass', label: 'Masses [Mjup]', example: 'geomspace(0.5,80,56)' },
  { axis: 'semiMajorAxis', label: 'Semi-major axes [AU]', example: 'geomspace(1,1000,64)' },
];

/** The axes of an array file that holds none. */
export function AxisFields({
  settings,
  onSettings,
}: {
  settings: UploadSettings;
  onSettings: (settings: UploadSettings) => void;
}) {
  return axes.map(({ axis, label, example }) => (
    <TextField
      key={axis}
      label={label}
      placeholder={example}
      defaultValue={settings.axes?.[axis] ?? ''}
      onBlur={(event) => {
        const value = event.target.value.trim() || undefined;
        if (value !== settings.axes?.[axis]) {
          onSettings({ ...settings, axes: { ...settings.axes, [axis]: value } });
        }
      }}
    />
  ));
}
