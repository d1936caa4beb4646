'use client';

import type { RefObject } from 'react';
import { useAction } from '@/components/hooks/use-action';
import { Menu, MenuAction, MenuNote, MenuRule } from '@/components/ui/menu';
import type { DataTable } from './data-table';
import type { FigureColumn, FigureType } from './export-figure';
import type { FigureSettings } from './figure-context';

interface FigureMenuProps {
  settings: FigureSettings;
  /** A word for the file's name: "posterior". */
  name: string;
  /** The sentence that the drawing says to readers. */
  description: string;
  data?(): DataTable[];
  figure: RefObject<HTMLElement | null>;
}

const columns: [FigureColumn, words: string][] = [
  ['single', 'One column, 88 mm'],
  ['double', 'Two columns, 180 mm'],
];
const types: [FigureType, words: string][] = [
  ['svg', 'SVG'],
  ['pdf', 'PDF'],
  ['png', 'PNG, 300 dots per inch'],
];

/** Files of one drawing; what makes them is loaded when the first is asked for. */
export function FigureMenu({ settings, name, description, data, figure }: FigureMenuProps) {
  const { perform, isBusy, problem } = useAction();
  const hasNumbers = data !== undefined || settings.tables !== undefined;
  const make = (work: (files: typeof import('./export-figure')) => Promise<void>) => () =>
    void perform(async () => work(await import('./export-figure')));
  const words = { ...settings, name, description };
  return (
    <span className="ml-auto print:hidden">
      <Menu
        look="plain"
        align="right"
        label={isBusy ? 'making the file' : 'export'}
        accessibleName={`Export this figure: ${name.replaceAll('-', ' ')}`}
      >
        <MenuNote>{settings.label}: said in every figure</MenuNote>
        {columns.map(([column, heading]) => (
          <div key={column}>
            <MenuNote>{heading}</MenuNote>
            {types.map(([type, label]) => (
              <MenuAction
                key={type}
                onSelect={make((files) => files.saveFigure(figure.current, words, type, column))}
              >
                {label}
              </MenuAction>
            ))}
          </div>
        ))}
        <MenuRule />
        {hasNumbers && (
          <MenuAction
            onSelect={make(async (files) => {
              files.saveTables(settings.file, data?.() ?? (await settings.tables?.()) ?? []);
            })}
          >
            Numbers, CSV
          </MenuAction>
        )}
        <MenuAction onSelect={make(async (files) => files.saveConditions(words))}>
          What they rest on, JSON
        </MenuAction>
      </Menu>
      {problem !== undefined && (
        <span role="alert" className="block text-bad text-note">
          No file was made: {problem}
        </span>
      )}
    </span>
  );
}
