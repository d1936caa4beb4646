'use client';

import { type ReactNode, useMemo } from 'react';
import { type FigureSettings, FigureSettingsProvider } from '@/components/charts/figure-context';
import { figurePdf } from '@/components/hooks/figure-pdf';

interface FigureFrameProps extends Omit<FigureSettings, 'toPdf'> {
  collaboration: string;
  children: ReactNode;
}

/** Gives every chart inside it the same words for its files: title, state and what it rests on. */
export function FigureFrame({ collaboration, children, ...words }: FigureFrameProps) {
  const { file, title, caption, label, tables } = words;
  const lines = caption.join('\n');
  const settings = useMemo<FigureSettings>(
    () => ({
      ...{ file, title, label, tables },
      caption: lines.split('\n'),
      toPdf: (svg) => figurePdf(collaboration, svg),
    }),
    [collaboration, file, title, label, lines, tables],
  );
  return <FigureSettingsProvider value={settings}>{children}</FigureSettingsProvider>;
}
