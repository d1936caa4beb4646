import 'katex/dist/katex.min.css';
import type { TypesetPart } from '@/lib/help/typeset';

/** Markup that the server set from a formula of our own source; nothing that anybody wrote gets here. */
function SetFormula({ html }: { html: string }) {
  return (
    <span
      // biome-ignore lint/security/noDangerouslySetInnerHtml: KaTeX answers in markup, and only formulas of lib/help are given to it
      dangerouslySetInnerHTML={{ __html: html }}
    />
  );
}

/** A paragraph with its formulas. */
export function TypesetText({ parts }: { parts: TypesetPart[] }) {
  return parts.map((part, at) =>
    part.html === undefined ? (
      part.text
    ) : (
      // biome-ignore lint/suspicious/noArrayIndexKey: the parts of a paragraph have their place as name
      <SetFormula key={at} html={part.html} />
    ),
  );
}

/** Formulas, one a line, each with its words; wide ones scroll inside themselves. */
export function Formulas({ formulas }: { formulas: { html: string; reads: string }[] }) {
  if (formulas.length === 0) return null;
  return (
    <ul className="grid gap-3">
      {formulas.map(({ html, reads }) => (
        <li key={reads}>
          {/* biome-ignore lint/a11y/noNoninteractiveTabindex: a region that scrolls must be reachable by keyboard */}
          <div className="formula overflow-x-auto overflow-y-hidden" tabIndex={0}>
            <SetFormula html={html} />
          </div>
          <p className="mt-1 max-w-[72ch] text-ink3 text-note">{reads}</p>
        </li>
      ))}
    </ul>
  );
}
