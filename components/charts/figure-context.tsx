'use client';

import { createContext, useContext } from 'react';
import type { DataTable } from './data-table';

/** What the figures of a section rest on: their files say it, whatever the drawing is. */
export interface FigureSettings {
  /** Begins the names of files: "A-31-run-18". */
  file: string;
  title: string;
  /** Everything that the numbers rest on, line by line. */
  caption: string[];
  /** "draft, run 18": stands above the drawing. */
  label: string;
  /** The drawing as PDF. */
  toPdf(svg: string): Promise<Blob>;
  /** Numbers of a drawing that brings none of its own. */
  tables?(): Promise<DataTable[]>;
}

const Settings = createContext<FigureSettings | undefined>(undefined);

export const FigureSettingsProvider = Settings.Provider;

/** Undefined where figures are not exported, such as in a preview of a file. */
export function useFigureSettings(): FigureSettings | undefined {
  return useContext(Settings);
}
