'use client';

import dynamic from 'next/dynamic';
import { useState } from 'react';
import type { ExportSource } from '@/components/hooks/use-exports';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { TextAction } from '@/components/ui/text-action';

const ExportFiles = dynamic(() => import('./export-files').then((module) => module.ExportFiles), {
  loading: () => <p className="py-6 text-ink3 text-note">Looking what there is</p>,
});

interface ExportButtonProps {
  collaboration: string;
  source: ExportSource;
  /** Heads the dialog: "Files of run 18". */
  title: string;
  drawings?: { name: string; label: string }[];
  look?: 'button' | 'text';
}

/** Opens the list of files that something can be saved as. */
export function ExportButton({ look = 'button', title, ...rest }: ExportButtonProps) {
  const [isOpen, setOpen] = useState(false);
  const open = () => setOpen(true);
  const name = `Export: ${title.charAt(0).toLowerCase()}${title.slice(1)}`;
  return (
    <>
      {look === 'button' ? (
        <Button icon="download" onClick={open} aria-label={name}>
          Export
        </Button>
      ) : (
        <TextAction icon="download" onClick={open} aria-label={name}>
          Export
        </TextAction>
      )}
      <Dialog isOpen={isOpen} onClose={() => setOpen(false)} title={title}>
        {isOpen && <ExportFiles {...rest} />}
      </Dialog>
    </>
  );
}
