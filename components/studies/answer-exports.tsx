'use client';

import { type RefObject, useState } from 'react';
import { drawingToSvg, svgToPng } from '@/components/charts/export-drawing';
import { saveFile } from '@/components/charts/save-file';
import { sentenceOf } from '@/components/hooks/api-problem';
import { Menu, MenuAction } from '@/components/ui/menu';
import { Notice } from '@/components/ui/notice';
import type { StudyKind } from '@/lib/schemas/study-settings';
import { answerFileName, fileHead, writeAnswerJson, writeDataCsv } from './data-files';
import type { AnswerProps, KindEntry } from './kind-entry';
import { kindWords } from './kind-words';

interface AnswerExportsProps<Kind extends StudyKind> {
  entry: KindEntry<Kind>;
  answer: AnswerProps<Kind>;
  /** Holds the drawings. */
  area: RefObject<HTMLElement | null>;
}

/** Files of an answer, made in the page from what it shows; each says that it is a draft. */
export function AnswerExports<Kind extends StudyKind>(props: AnswerExportsProps<Kind>) {
  const { entry, answer, area } = props;
  const [problem, setProblem] = useState<string>();
  const { study, asked } = answer;
  const name = answerFileName(study);
  const { conditions } = asked.result.statement;

  const make = (write: () => Promise<void>) => async () => {
    setProblem(undefined);
    try {
      await write();
    } catch (reason) {
      setProblem(sentenceOf(reason));
    }
  };
  const figures = (save: (svg: string, file: string) => Promise<void>) =>
    make(async () => {
      const drawings = [
        ...(area.current?.querySelectorAll<SVGSVGElement>('figure svg.chart') ?? []),
      ];
      if (drawings.length === 0) throw new Error('This answer has no drawing.');
      for (const [index, drawing] of drawings.entries()) {
        const svg = drawingToSvg(drawing, {
          title: `${kindWords[study.settings.kind].title}, ${study.run.analysisKey}, run ${study.run.number}`,
          description: drawing.getAttribute('aria-label') ?? '',
          caption: captionOf(answer, entry.settingsInWords(answer.settings)),
          label: `draft, run ${study.run.number}`,
        });
        await save(svg, drawings.length === 1 ? name : `${name}-${index + 1}`);
      }
    });

  return (
    <div>
      <Menu
        label="Export"
        accessibleName={`Export files of question ${study.number}`}
        align="right"
      >
        <p className="px-3.5 py-1 text-chart text-ink3">
          Draft, run {study.run.number}: said in every file
        </p>
        <MenuAction
          onSelect={figures(async (svg, file) => saveFile(`${file}.svg`, svg, 'image/svg+xml'))}
        >
          Figure, SVG
        </MenuAction>
        <MenuAction
          onSelect={figures(async (svg, file) =>
            saveFile(`${file}.png`, await svgToPng(svg), 'image/png'),
          )}
        >
          Figure, PNG
        </MenuAction>
        <MenuAction
          onSelect={make(async () => {
            const tables = (await entry.loadTables())(answer);
            const csv = writeDataCsv(fileHead(study, conditions), tables);
            saveFile(`${name}.csv`, csv, 'text/csv');
          })}
        >
          Numbers of the figure, CSV
        </MenuAction>
        <MenuAction
          onSelect={make(async () => {
            saveFile(`${name}.json`, writeAnswerJson(study, conditions), 'application/json');
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

function captionOf(
  { study, asked }: Pick<AnswerProps<StudyKind>, 'study' | 'asked'>,
  settings: string,
): string[] {
  return [
    `${kindWords[study.settings.kind].title}: ${settings}. ${study.headline ?? ''}`.trim(),
    `${asked.result.statement.sentence}.`,
    asked.result.statement.conditions.map((condition) => `${condition}.`).join(' '),
    `SHA-256 ${study.resultDigest ?? ''}, seed ${study.seed}, engine ${study.engineVersion}`,
  ];
}
