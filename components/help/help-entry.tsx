import { Link } from '@/components/ui/link';
import { Conditions } from '@/components/ui/plate';
import { SectionOpener } from '@/components/ui/section-opener';
import { type HelpWord, helpDrawing, helpGroups, helpWordNames, helpWords } from '@/lib/help';
import { helpDefinition } from '@/lib/help/definition';
import { HelpFigure } from './help-figure';
import { Formulas, TypesetText } from './typeset';

/** One word: what it means, its formulas, units, source, a drawing, and what to read next. */
export function HelpEntryPage({ word }: { word: HelpWord }) {
  const { group, figure } = helpWords[word];
  const { title, paragraph, formulas, units, source, seeAlso } = helpDefinition(word);
  return (
    <article className="help-entry grid gap-x-14 gap-y-8 pt-6 lg:grid-cols-[minmax(0,3fr)_minmax(0,2fr)]">
      <div className="min-w-0">
        <p className="text-ink3 text-note">
          <Link href="/help">Help</Link>
          <span className="mx-2">/</span>
          {helpGroups[group]}
        </p>
        <h1 className="mt-1 mb-4 font-light text-title">{title}</h1>
        <p className="max-w-[72ch] text-value">
          <TypesetText parts={paragraph} />
        </p>
        {formulas.length > 0 && (
          <section className="mt-7">
            <SectionOpener title="Formula" />
            <Formulas formulas={formulas} />
          </section>
        )}
        <section className="mt-7">
          <SectionOpener title="Units and source" />
          <Conditions
            rows={[
              { name: 'Units', value: units },
              { name: 'Source', value: source },
            ]}
          />
        </section>
        <section className="mt-7">
          <SectionOpener title="See also" />
          <ul className="flex flex-wrap gap-x-6">
            {seeAlso.map((other) => (
              <li key={other.word}>
                <Link href={`/help/${other.word}`} className="inline-block py-1.5 font-semibold">
                  {other.title}
                </Link>
              </li>
            ))}
          </ul>
        </section>
      </div>
      <div className="min-w-0">
        {figure !== undefined && (
          <HelpFigure drawing={helpDrawing(figure)} word={word} title={title} />
        )}
        <nav aria-label={helpGroups[group]} className="mt-7">
          <SectionOpener title={helpGroups[group]} />
          <ul className="columns-2 gap-6 text-note max-sm:columns-1">
            {helpWordNames
              .filter((other) => helpWords[other].group === group)
              .map((other) => (
                <li key={other}>
                  <Link
                    href={`/help/${other}`}
                    className="inline-block py-1"
                    aria-current={other === word ? 'page' : undefined}
                  >
                    {helpWords[other].title}
                  </Link>
                </li>
              ))}
          </ul>
        </nav>
      </div>
    </article>
  );
}
