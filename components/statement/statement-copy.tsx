'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { fetchStatement } from '@/components/hooks/use-statement';
import { Menu, MenuAction } from '@/components/ui/menu';
import type { LimitDocument } from '@/lib/inference/statement-document';
import type { StatementQuery } from '@/lib/schemas/statement';

type Form = 'text' | 'latex' | 'json';
const forms: Record<Form, string> = { text: 'text', latex: 'LaTeX', json: 'JSON' };

interface CopyMenuProps {
  /** Which limit it is, where a screen shows several: "the 95 % limit". */
  of?: string;
  /** Left out of sight where a table repeats it. */
  label?: string;
  align?: 'left' | 'right';
  write(form: Form): Promise<string>;
}

/** Takes a limit along with all its conditions: as text, LaTeX or JSON. */
function CopyMenu({ of = 'this limit', label = 'Copy statement', align, write }: CopyMenuProps) {
  const [said, setSaid] = useState('');
  const copy = async (form: Form) => {
    try {
      await navigator.clipboard.writeText(await write(form));
      setSaid(`Copied as ${forms[form]}`);
    } catch (reason) {
      setSaid(`Not copied: ${sentenceOf(reason)}`);
    }
  };
  return (
    <span className="inline-flex items-center gap-2">
      <Menu
        label={label}
        accessibleName={`Copy ${of} with its conditions`}
        look="quiet"
        align={align}
      >
        {(Object.keys(forms) as Form[]).map((form) => (
          <MenuAction key={form} onSelect={() => void copy(form)}>
            As {forms[form]}
          </MenuAction>
        ))}
      </Menu>
      <span className="text-chart text-ink3" aria-live="polite">
        {said}
      </span>
    </span>
  );
}

type Place = Pick<CopyMenuProps, 'of' | 'label' | 'align'>;

/** Of a limit that a page computed: its words are made in the page, when somebody asks. */
export function ShownStatementCopy({ make, ...place }: Place & { make(): Promise<LimitDocument> }) {
  const write = async (form: Form) => {
    const { limitAsJson, limitAsLatex, limitAsText } = await import(
      '@/lib/inference/statement-forms'
    );
    return { text: limitAsText, latex: limitAsLatex, json: limitAsJson }[form](await make());
  };
  return <CopyMenu {...place} write={write} />;
}

/** Of a limit that a run recorded. */
export function RecordedStatementCopy({
  collaboration,
  runId,
  choice = {},
  ...place
}: Place & { collaboration: string; runId: string; choice?: Omit<StatementQuery, 'as'> }) {
  return (
    <CopyMenu
      {...place}
      write={(form) => fetchStatement(collaboration, runId, { ...choice, as: form })}
    />
  );
}
