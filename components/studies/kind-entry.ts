import type { ComponentType } from 'react';
import type { DataTable } from '@/components/charts/data-table';
import type { Fault } from '@/lib/errors';
import type { RateQuantity } from '@/lib/quantities/display';
import type { AnalysisView } from '@/lib/schemas/analyses';
import type { ListedDefinition } from '@/lib/schemas/populations';
import type { DrawnInputs, DrawnResult, DrawnRun } from '@/lib/schemas/runs';
import type { StudyView } from '@/lib/schemas/studies';
import type { ResultOf } from '@/lib/schemas/study-results';
import type { SettingsOf, StudyKind } from '@/lib/schemas/study-settings';

/** A finished run, of which a question is asked. */
export interface AskedRun {
  collaboration: string;
  analysis: AnalysisView;
  run: DrawnRun;
  inputs: DrawnInputs;
  result: DrawnResult;
  /** The population of the run; null until it is known. */
  definition: ListedDefinition | null;
  quantity: RateQuantity;
  credibleLevel: number;
}

export interface FormProps<Kind extends StudyKind> {
  /** The run that a new question is asked of: the newest finished one. */
  asked: AskedRun;
  /** Settings of the answer on the screen, from which a next question starts. */
  start?: SettingsOf<Kind>;
  isBusy: boolean;
  /** Why this person cannot ask. */
  disabledReason?: string;
  /** What the server found wrong, a fault a field. */
  faults: Fault[];
  onAsk(settings: SettingsOf<Kind>): void;
}

export interface AnswerProps<Kind extends StudyKind> {
  /** The run that this answer was computed from, not always the newest. */
  asked: AskedRun;
  study: StudyView;
  settings: SettingsOf<Kind>;
  result: ResultOf<Kind>;
}

/** What a kind of question brings to the shared frame. */
export interface KindEntry<Kind extends StudyKind> {
  Form: ComponentType<FormProps<Kind>>;
  Answer: ComponentType<AnswerProps<Kind>>;
  /** "outer cutoff 30–1000 AU, 31 values": tells answers of a kind apart. */
  settingsInWords(settings: SettingsOf<Kind>): string;
  /** Numbers of the drawing for files, unrounded; loaded when they are asked for. */
  loadTables(): Promise<(props: AnswerProps<Kind>) => DataTable[]>;
}
