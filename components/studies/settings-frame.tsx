import type { ReactNode } from 'react';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';

interface SettingsFrameProps {
  /** Fields in a row where there is width. */
  children?: ReactNode;
  /** What asking will compute, in one line. */
  note?: ReactNode;
  /** A fault that belongs to no field. */
  error?: string;
  isBusy: boolean;
  disabledReason?: string;
  onSubmit(): void;
}

/** The ground of a settings form: fields, what they cost, and the one button. */
export function SettingsFrame(props: SettingsFrameProps) {
  const { children, note, error, isBusy, disabledReason, onSubmit } = props;
  return (
    <form
      className="rounded-plate bg-well px-[22px] py-4 max-md:-mx-[22px] max-md:rounded-none md:px-5"
      aria-label="Settings of the question"
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        if (disabledReason === undefined && !isBusy) onSubmit();
      }}
    >
      <div className="flex flex-wrap items-end gap-x-5 gap-y-3">
        {children}
        <div className="max-md:w-full">
          <Button
            type="submit"
            variant="primary"
            isBusy={isBusy}
            disabledReason={disabledReason}
            isWide
            className="min-w-24"
          >
            Ask
          </Button>
        </div>
      </div>
      {note !== undefined && <p className="mt-2.5 text-ink3 text-note">{note}</p>}
      {error !== undefined && (
        <div className="mt-3">
          <Notice tone="bad" title="It was not asked." isAnnounced>
            {error}
          </Notice>
        </div>
      )}
    </form>
  );
}
