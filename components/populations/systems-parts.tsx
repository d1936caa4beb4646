'use client';

import { JupiterMass } from '@/components/ui/notation';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { populationConditions } from '@/lib/inference/population-words';
import type { SystemsPopulation } from '@/lib/population';
import {
  formatPercent,
  formatRange,
  formatSignificant,
  THIN_SPACE,
} from '@/lib/quantities/display';
import { BuilderPart } from './builder-part';
import type { PreviewSetting } from './builder-setting';
import { FractionPart } from './fraction-part';
import { factsOfSystems } from './systems-facts';

interface SystemsPartsProps {
  population: SystemsPopulation;
  range: {
    massMinMjup: number;
    massMaxMjup: number;
    semiMajorAxisMinAu: number;
    semiMajorAxisMaxAu: number;
  };
  orbits: string;
  setting: PreviewSetting;
  onSetting(setting: PreviewSetting): void;
}

/** A table of systems in parts: nothing of it can be moved, all of it is said. */
export function SystemsParts({ population, range, orbits, setting, onSetting }: SystemsPartsProps) {
  const facts = factsOfSystems(population);
  const [least, heaviest] = facts.weightShares;
  const conditions = (isHostFraction: boolean) =>
    populationConditions(population, isHostFraction, null).map(({ text }) => text);
  return (
    <div className="rounded-plate bg-well px-5 pt-1.5 pb-3.5 max-md:-mx-[22px] max-md:rounded-none max-md:px-[22px]">
      <BuilderPart number={1} title="Systems" form="from a table">
        <Table caption="Systems of the table by their number of companions">
          <TableHead>
            <tr>
              <HeadCell>companions</HeadCell>
              <HeadCell isNumeric>systems</HeadCell>
              <HeadCell isNumeric>share by weight</HeadCell>
            </tr>
          </TableHead>
          <TableBody>
            {facts.byCompanions
              .filter(({ systems }) => systems > 0)
              .map(({ companions, isMore, systems, share }) => (
                <Row key={companions}>
                  <Cell>
                    {companions === 0 ? 'none' : companions}
                    {isMore && ' or more'}
                  </Cell>
                  <Cell isNumeric>{systems}</Cell>
                  <Cell isNumeric>{formatPercent(share)}</Cell>
                </Row>
              ))}
            <Row isTotal>
              <Cell>all</Cell>
              <Cell isNumeric>{facts.systems}</Cell>
              <Cell isNumeric>{formatPercent(1)}</Cell>
            </Row>
          </TableBody>
        </Table>
        <p className="mt-2 text-ink2 text-note">
          {facts.companions} companions, {formatSignificant(facts.meanCompanions, 2)} a system by
          weight, of {formatRange(range.massMinMjup, range.massMaxMjup, '')}
          {THIN_SPACE}
          <JupiterMass /> at {formatRange(range.semiMajorAxisMinAu, range.semiMajorAxisMaxAu, 'AU')}
          .
        </p>
      </BuilderPart>
      <BuilderPart number={2} title="Weights">
        <p className="text-ink2 text-note">
          {facts.hasEqualWeights
            ? 'Every system weighs the same.'
            : `One system weighs from ${formatPercent(least)} to ${formatPercent(heaviest)} of all.`}
        </p>
      </BuilderPart>
      <BuilderPart number={3} title="Orbits" form="with the maps">
        <p className="text-ink2 text-note">{orbits}</p>
      </BuilderPart>
      <BuilderPart number={4} title="What a run will ask">
        <ul className="grid gap-1.5 text-ink2 text-note">
          <li>
            <b className="text-ink">Host fraction:</b> which fraction of stars may have such a
            system; {conditions(true).join('; ')}.
          </li>
          <li>
            <b className="text-ink">Mean number:</b> how many such systems a star may have;{' '}
            {conditions(false).join('; ')}.
          </li>
        </ul>
      </BuilderPart>
      <FractionPart number={5} setting={setting} onSetting={onSetting} />
    </div>
  );
}
