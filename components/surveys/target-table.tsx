'use client';

import { useMemo, useState } from 'react';
import { ProbabilityBar } from '@/components/charts/probability-bar';
import { seriesColour } from '@/components/charts/series';
import { Sparkline } from '@/components/charts/sparkline';
import { Button } from '@/components/ui/button';
import { SelectField } from '@/components/ui/select-field';
import { StateMark } from '@/components/ui/state-mark';
import { Cell, ErrorTerm, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { TextField } from '@/components/ui/text-field';
import type { TargetView } from '@/lib/schemas/surveys';
import { formatErrorPart, formatMeasured } from './measured';

const PAGE = 21;

/** Columns that a narrow screen leaves to the panel of the chosen star. */
const wide = 'max-md:hidden';
const wider = 'max-lg:hidden';

function MapMark({ target }: { target: TargetView }) {
  if (target.leftOutReason !== null) return <StateMark kind="stopped">left out</StateMark>;
  if (target.mapState === 'failed')
    return <StateMark kind="bad">{target.mapFault ?? 'no map'}</StateMark>;
  if (target.mapState === 'waiting') return <StateMark kind="running">map on its way</StateMark>;
  if (target.mapState === 'none') return <StateMark kind="waiting">no curve, no map</StateMark>;
  if (target.checks.length > 0) return <StateMark kind="warn">{target.checks[0]}</StateMark>;
  return (
    <StateMark kind="ok">
      <span className="sr-only">no remarks</span>
    </StateMark>
  );
}

function TargetLine({
  target,
  isSelected,
  onSelect,
}: {
  target: TargetView;
  isSelected: boolean;
  onSelect(): void;
}) {
  const curve = target.curves.at(-1);
  return (
    <Row isSelected={isSelected} onClick={onSelect} className="cursor-pointer">
      <Cell isRowHead className="whitespace-nowrap">
        <button
          type="button"
          className="text-left font-semibold"
          aria-pressed={isSelected}
          onClick={onSelect}
        >
          {target.name}
        </button>
        <span className="block font-normal text-chart text-ink3 md:hidden">
          {[target.spectralType, target.movingGroup ?? 'field'].filter(Boolean).join(', ')}
        </span>
      </Cell>
      <Cell className={wide}>{target.spectralType ?? '–'}</Cell>
      <Cell isNumeric className={wide}>
        {target.distancePc === null
          ? '–'
          : formatMeasured(target.distancePc, target.distanceErrorPc)}
        {target.distanceErrorPc !== null && (
          <ErrorTerm>{formatErrorPart(target.distanceErrorPc)}</ErrorTerm>
        )}
      </Cell>
      <Cell isNumeric className={wide}>
        {target.ageMyr === null ? '–' : formatMeasured(target.ageMyr, null)}
        {target.ageMyr !== null && (
          <ErrorTerm>
            {target.ageUpperMyr === null
              ? '?'
              : formatErrorPart(target.ageUpperMyr - target.ageMyr)}
          </ErrorTerm>
        )}
      </Cell>
      <Cell className={`whitespace-nowrap ${wider}`}>{target.movingGroup ?? 'field'}</Cell>
      <Cell className={wider}>
        {curve && (
          <Sparkline
            width={68}
            xs={Float64Array.from(curve.separationArcsec)}
            ys={Float64Array.from(curve.contrastMag)}
            isLogX
            isDownward
            label={`Contrast curve of ${target.name}`}
          />
        )}
      </Cell>
      <Cell>
        {target.probability !== null && <ProbabilityBar value={target.probability} width={52} />}
      </Cell>
      <Cell isNumeric>
        {target.probability === null ? '–' : `${Math.round(100 * target.probability)} %`}
      </Cell>
      <Cell className={wide}>
        <span className="flex gap-x-2">
          {target.alsoIn.length === 0 && '–'}
          {target.alsoIn.map((survey) => (
            <span
              key={survey.slug}
              className="border-l-[3px] pl-1.5 text-[12px] tracking-wide"
              style={{ borderColor: seriesColour(survey.position) }}
            >
              {survey.name}
            </span>
          ))}
        </span>
      </Cell>
      <Cell className="whitespace-nowrap">
        <MapMark target={target} />
      </Cell>
    </Row>
  );
}

interface TargetTableProps {
  targets: TargetView[];
  selectedId: string | null;
  onSelect(id: string): void;
}

type Sharing = 'any' | 'shared' | 'alone';

/** Targets with filters that combine; the count of what is shown is always said. */
export function TargetTable({ targets, selectedId, onSelect }: TargetTableProps) {
  const [words, setWords] = useState('');
  const [group, setGroup] = useState('any');
  const [sharing, setSharing] = useState<Sharing>('any');
  const [start, setStart] = useState(0);
  const groups = useMemo(
    () => [...new Set(targets.map((target) => target.movingGroup ?? 'field'))].sort(),
    [targets],
  );
  const shown = useMemo(() => {
    const needle = words.trim().toLowerCase();
    return targets.filter((target) => {
      const own = target.movingGroup ?? 'field';
      const text = `${target.name} ${target.spectralType ?? ''} ${own}`.toLowerCase();
      if (needle !== '' && !text.includes(needle)) return false;
      if (group !== 'any' && own !== group) return false;
      if (sharing === 'any') return true;
      return target.alsoIn.length > 0 === (sharing === 'shared');
    });
  }, [targets, words, group, sharing]);
  const from = Math.min(start, Math.max(0, shown.length - 1));
  const page = shown.slice(from, from + PAGE);
  const change = (apply: () => void) => {
    apply();
    setStart(0);
  };
  return (
    <div>
      <div className="mb-2 flex flex-wrap items-end gap-x-3 gap-y-2 max-md:[&>div]:w-full">
        <TextField
          label="Find a star, group or type"
          isLabelHidden
          placeholder="Star, group or type"
          value={words}
          onChange={(event) => change(() => setWords(event.target.value))}
        />
        <SelectField
          label="Group"
          isLabelHidden
          value={group}
          onChange={(event) => change(() => setGroup(event.target.value))}
          options={[
            { value: 'any', label: 'any group' },
            ...groups.map((name) => ({ value: name, label: name })),
          ]}
        />
        <SelectField
          label="Other surveys"
          isLabelHidden
          value={sharing}
          onChange={(event) => change(() => setSharing(event.target.value as Sharing))}
          options={[
            { value: 'any', label: 'any survey' },
            { value: 'shared', label: 'in another survey' },
            { value: 'alone', label: 'in this survey only' },
          ]}
        />
        <span className="ml-auto text-[14px] text-ink3" aria-live="polite">
          by right ascension; {shown.length} of {targets.length} shown
        </span>
      </div>
      <Table caption="Targets of the survey">
        <TableHead>
          <Row>
            <HeadCell>star</HeadCell>
            <HeadCell className={wide}>type</HeadCell>
            <HeadCell isNumeric className={wide}>
              distance, pc
            </HeadCell>
            <HeadCell isNumeric className={wide}>
              age, Myr
            </HeadCell>
            <HeadCell className={wider}>group</HeadCell>
            <HeadCell className={wider}>curve</HeadCell>
            <HeadCell colSpan={2}>
              <span className="max-md:hidden">detection probability</span>
              <span className="md:hidden">seen</span>
            </HeadCell>
            <HeadCell className={wide}>also in</HeadCell>
            <HeadCell>check</HeadCell>
          </Row>
        </TableHead>
        <TableBody>
          {page.map((target) => (
            <TargetLine
              key={target.id}
              target={target}
              isSelected={target.id === selectedId}
              onSelect={() => onSelect(target.id)}
            />
          ))}
        </TableBody>
      </Table>
      <div className="mt-3 flex items-center justify-between text-[14px] text-ink3">
        <span>
          {shown.length === 0
            ? 'No target fits these filters'
            : `Targets ${from + 1}–${from + page.length}`}
        </span>
        <span className="flex gap-2">
          {from > 0 && (
            <Button size="small" variant="quiet" onClick={() => setStart(Math.max(0, from - PAGE))}>
              Back {PAGE}
            </Button>
          )}
          {from + PAGE < shown.length && (
            <Button size="small" variant="quiet" onClick={() => setStart(from + PAGE)}>
              Next {Math.min(PAGE, shown.length - from - PAGE)}
            </Button>
          )}
        </span>
      </div>
    </div>
  );
}
