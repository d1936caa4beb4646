'use client';

import { useState } from 'react';
import { useAction } from '@/components/hooks/use-action';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { SelectField } from '@/components/ui/select-field';
import { TextField } from '@/components/ui/text-field';
import type { ChangeSettings, SettingsView } from '@/lib/schemas/settings';

export interface SettingsPartProps {
  settings: SettingsView;
  save(change: ChangeSettings, words: string): Promise<void>;
}

/** Name, address and time zone. */
export function PlaceForm({ settings, save, zones }: SettingsPartProps & { zones: string[] }) {
  const [name, setName] = useState(settings.name);
  const [slug, setSlug] = useState(settings.slug);
  const [timeZone, setTimeZone] = useState(settings.timeZone);
  const { perform, isBusy } = useAction();
  const isLocked = !settings.can.manage;
  const isChanged =
    name !== settings.name || slug !== settings.slug || timeZone !== settings.timeZone;
  return (
    <form
      className="flex max-w-[440px] flex-col gap-4"
      onSubmit={(event) => {
        event.preventDefault();
        void perform(() => save({ name, slug, timeZone }, 'Name and dates are saved.'));
      }}
    >
      <TextField
        label="Name"
        value={name}
        maxLength={100}
        required
        disabled={isLocked}
        onChange={({ target }) => setName(target.value)}
      />
      <TextField
        label="Address"
        hint="Lower-case letters, digits and hyphens; it begins every link to this collaboration"
        value={slug}
        maxLength={39}
        pattern="[a-z0-9][a-z0-9\-]{1,38}"
        required
        disabled={isLocked}
        onChange={({ target }) => setSlug(target.value)}
      />
      {slug !== settings.slug && (
        <Notice tone="warn" title="Links to the old address stop working.">
          Those in mail that was sent and in scripts too.
        </Notice>
      )}
      <SelectField
        label="Time zone"
        hint="Of the times in log and activity; other days, files and the API keep UTC"
        value={timeZone}
        disabled={isLocked}
        onChange={({ target }) => setTimeZone(target.value)}
        options={zones.map((value) => ({ value, label: value.replaceAll('_', ' ') }))}
      />
      {!isLocked && (
        <div>
          <Button
            type="submit"
            isBusy={isBusy}
            disabledReason={isChanged ? undefined : 'Nothing is changed'}
          >
            Save
          </Button>
        </div>
      )}
    </form>
  );
}
