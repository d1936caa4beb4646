'use client';

import { useState } from 'react';
import { saveFile } from '@/components/charts/save-file';
import { sentenceOf } from '@/components/hooks/api-problem';
import { Menu, MenuAction, MenuNote } from '@/components/ui/menu';
import { Notice } from '@/components/ui/notice';
import type { StudyKind } from '@/lib/schemas/study-settings';
import { answerFigures, answerFileName, writeAnswerJson } from './answer-files';
import type { AnswerProps, KindEntry } from './kind-entry';

interface AnswerExportsProps<Kind extends StudyKind> {
  entry: KindEntry<Kind>;
  answer: AnswerProps<Kind>;
}

/** Numbers of an answer, made in the page from what it shows; its figures have menus of their own. */
export function AnswerExports<Kind extends StudyKind>({ entry, answer }: AnswerExportsProps<Kind>) {
  const [problem, setProblem] = useState<string>();
  const { study, asked } = answer;
  const make = (write: () => void | Promise<void>) => async () => {
    setProblem(undefined);
    try {
      await write();
    } catch (reason) {
      setProblem(sentenceOf(reason));
    }
  };
  return (
    <div>
      <Menu
        label="Export"
        accessibleName={`Export files of question ${study.number}`}
        align="right"
      >
        <MenuNote>Draft, run {study.run.number}: said in the JSON and in every figure</MenuNote>
        <MenuAction
          onSelect={make(async () => {
            const { saveTables } = await import('@/components/charts/export-figure');
            const { file, tables } = answerFigures(entry, answer);
            saveTables(file, (await tables?.()) ?? []);
          })}
        >
          Numbers, CSV
        </MenuAction>
        <MenuAction
          onSelect={make(() => {
            const json = writeAnswerJson(study, asked.result.statement.conditions);
            saveFile(`${answerFileName(study)}.json`, json, 'application/json');
          })}
        >
          Everything, JSON
        </MenuAction>
      </Menu>
      {problem !== undefined && (
        <div className="absolute right-0 z-40 mt-1 max-w-sm">
          <Notice tone="bad" title="No file was made." isAnnounced>
            {problem}
          </Notice>
        </div>
      )}
    </div>
  );
}
