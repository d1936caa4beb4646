import { Link } from '@/components/ui/link';
import { SectionOpener } from '@/components/ui/section-opener';
import { type HelpGroup, helpGroups, helpWordNames, helpWords } from '@/lib/help';
import { typesetParagraph } from '@/lib/help/typeset';
import { TypesetText } from './typeset';

const LONGEST = 220;

/** Up to its first full stop, or its colon where that is far; those inside a formula end nothing. */
function firstSentence(definition: string): string {
  const sentence = /^(?:\$[^$]*\$|[^.$]|\.(?! ))*\.?/.exec(definition)?.[0] ?? definition;
  return sentence.length > LONGEST ? sentence.replace(/:.*$/s, '.') : sentence;
}

/** Every word, by group, each with what it means in a sentence. */
export function HelpContents() {
  return (
    <div className="grid gap-x-14 gap-y-10 lg:grid-cols-2">
      {(Object.keys(helpGroups) as HelpGroup[]).map((group) => (
        <section key={group} className="min-w-0">
          <SectionOpener title={helpGroups[group]} />
          <ul>
            {helpWordNames
              .filter((word) => helpWords[word].group === group)
              .map((word) => (
                <li
                  key={word}
                  className="grid gap-x-4 border-rule border-b py-1.5 sm:grid-cols-[13rem_1fr]"
                >
                  <Link href={`/help/${word}`} className="py-1 font-semibold">
                    {helpWords[word].title}
                  </Link>
                  <span className="py-1 text-ink2 text-note">
                    <TypesetText
                      parts={typesetParagraph(firstSentence(helpWords[word].definition))}
                    />
                  </span>
                </li>
              ))}
          </ul>
        </section>
      ))}
    </div>
  );
}
