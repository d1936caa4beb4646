import type { ReactNode } from 'react';
import { HelpMark } from '@/components/help/help-mark';
import type { HelpWord } from '@/lib/help';
import { FormulaWords } from './formula-words';

/** The one dark surface of the light theme: holds one statement, at most one a page. */
export function Plate({
  children,
  className = '',
  id = 'statement',
}: {
  children: ReactNode;
  className?: string;
  id?: string;
}) {
  return (
    <section
      id={id}
      className={`plate rounded-plate px-[22px] pt-[18px] pb-3 max-md:-mx-[22px] max-md:rounded-none md:px-[34px] md:pt-[26px] md:pb-[18px] ${className}`}
    >
      {children}
    </section>
  );
}

/** "<5.8 %", with the sign light and the unit at half size. */
export function StatementNumber({
  value,
  unit,
  sign = '<',
  fontSizePx,
  isLive = false,
}: {
  value: string;
  unit?: string;
  sign?: string;
  fontSizePx?: number;
  /** Follows a control: read out politely when it has settled. */
  isLive?: boolean;
}) {
  return (
    <div
      className="statement-number my-2.5 -ml-[3px]"
      style={fontSizePx === undefined ? undefined : { fontSize: fontSizePx }}
      aria-live={isLive ? 'polite' : undefined}
    >
      <span className="sign">{sign}</span>
      {value}
      {unit !== undefined && <span className="unit">{unit}</span>}
    </div>
  );
}

export interface ConditionRow {
  name: string;
  value: ReactNode;
  /** The word that a mark behind the name explains. */
  help?: HelpWord;
}

/** A condition that a statement lists, "label: text", as a line in two columns. */
export function conditionRow(condition: string): ConditionRow {
  const at = condition.indexOf(': ');
  return { name: condition.slice(0, at), value: <FormulaWords text={condition.slice(at + 2)} /> };
}

/** What the number rests on: name and value, line by line; on a wide screen two a line if asked. */
export function Conditions({
  rows,
  isInPairs = false,
}: {
  rows: ConditionRow[];
  isInPairs?: boolean;
}) {
  return (
    <dl
      className={`grid grid-cols-[auto_1fr] gap-x-3.5 gap-y-[3px] text-ink2 text-note ${isInPairs ? 'lg:grid-cols-[auto_1fr_auto_1fr]' : ''}`}
    >
      {rows.map((row) => (
        <div key={row.name} className="contents">
          <dt className={`text-ink3 ${row.help === undefined ? '' : 'whitespace-nowrap'}`}>
            {row.name}
            {row.help !== undefined && <HelpMark word={row.help} />}
          </dt>
          <dd>{row.value}</dd>
        </div>
      ))}
    </dl>
  );
}

/** Marks a number that follows an unsaved control. */
export function LiveMark() {
  return (
    <span className="ml-2 inline-block rounded-[2px] border border-bound px-[7px] font-semibold text-bound text-chart">
      live
    </span>
  );
}
