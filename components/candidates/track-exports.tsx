'use client';

import { type RefObject, useState } from 'react';
import { drawingToSvg, svgToPng } from '@/components/charts/export-drawing';
import { saveFile } from '@/components/charts/save-file';
import { sentenceOf } from '@/components/hooks/api-problem';
import { Menu, MenuAction } from '@/components/ui/menu';
import { Notice } from '@/components/ui/notice';
import type { CandidateDetail } from '@/lib/schemas/candidates';
import { fitWords, whyNoTest } from './hypothesis-words';
import { statusWords } from './status-words';

interface TrackExportsProps {
  candidate: CandidateDetail;
  /** Holds the drawing. */
  area: RefObject<HTMLElement | null>;
}

/** What the figure rests on, below it in its file. */
export function trackCaption(candidate: CandidateDetail): string[] {
  const { hypotheses, motion } = candidate;
  return [
    hypotheses
      ? `Moves with its star: ${fitWords(hypotheses.commonProperMotion)}. At rest behind it: ${fitWords(hypotheses.background)}.`
      : whyNoTest(candidate),
    motion
      ? `Star: proper motion ${motion.pmRaMasYr.toFixed(1)} mas/yr east, ${motion.pmDecMasYr.toFixed(1)} north, parallax ${motion.parallaxMas.toFixed(2)} mas.`
      : '',
    'East is left; bars: 1 σ; the first epoch with errors is the reference. Orbital motion is not modelled.',
  ].filter((line) => line !== '');
}

/** The drawing as a file that says what it shows. */
export function TrackExports({ candidate, area }: TrackExportsProps) {
  const [problem, setProblem] = useState<string>();
  const name = `${candidate.star} ${candidate.name}`;
  const file = name.replace(/[^A-Za-z0-9+-]+/g, '-');
  const make = (write: (svg: string) => Promise<void>) => async () => {
    setProblem(undefined);
    try {
      const drawing = area.current?.querySelector<SVGSVGElement>('figure svg.chart');
      if (!drawing) throw new Error('There is no drawing.');
      await write(
        drawingToSvg(drawing, {
          title: name,
          description: drawing.getAttribute('aria-label') ?? '',
          caption: trackCaption(candidate),
          label: statusWords[candidate.status],
        }),
      );
    } catch (reason) {
      setProblem(sentenceOf(reason));
    }
  };
  return (
    <div className="relative">
      <Menu label="Export" accessibleName={`Export the figure of ${name}`} align="right">
        <MenuAction onSelect={make(async (svg) => saveFile(`${file}.svg`, svg, 'image/svg+xml'))}>
          Figure, SVG
        </MenuAction>
        <MenuAction
          onSelect={make(async (svg) => saveFile(`${file}.png`, await svgToPng(svg), 'image/png'))}
        >
          Figure, PNG
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
