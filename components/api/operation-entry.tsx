import { Link } from '@/components/ui/link';
import { SectionOpener } from '@/components/ui/section-opener';
import type { GuideOperation } from '@/lib/schemas/api-guide';
import { ApiPath } from './api-path';
import { FieldTable } from './field-table';

const who: Record<GuideOperation['access'], string> = {
  open: 'for anybody, without a token',
  session: 'only in a signed-in browser, not with a token',
  read: 'needs the scope read',
  write: 'needs the scope write',
  run: 'needs the scope run',
};

function Snippet({ language, text }: { language: string; text: string }) {
  return (
    <figure className="min-w-0">
      <figcaption className="mb-1 text-ink3 text-note">{language}</figcaption>
      <pre className="whitespace-pre-wrap break-words rounded-plate bg-well px-4 py-3 text-ink2 text-note">
        {text}
      </pre>
    </figure>
  );
}

/** One method of one address: what it takes, what it answers, how it refuses, how it is asked. */
export function OperationEntry({ operation }: { operation: GuideOperation }) {
  const { id, method, path, summary, access, parameters, body, answer, status } = operation;
  return (
    <section aria-labelledby={id} className="min-w-0 scroll-mt-6">
      <SectionOpener
        id={id}
        title={summary}
        context={who[access]}
        tools={
          <a href={`#${id}`} aria-label={`Link to ${summary}`}>
            #
          </a>
        }
      />
      <p className="mb-4 break-words">
        <code>
          <span className="font-semibold">{method}</span> <ApiPath path={path} />
        </code>
      </p>
      <div className="grid gap-x-14 gap-y-6 xl:grid-cols-2">
        <div className="flex min-w-0 flex-col gap-5">
          {parameters.length > 0 && <FieldTable caption="Parameters" fields={parameters} isSent />}
          {body.length > 0 && <FieldTable caption="Body, JSON" fields={body} isSent />}
          {answer.length > 0 && <FieldTable caption={`Answer ${status}, JSON`} fields={answer} />}
          {operation.files.length > 0 && (
            <p className="text-note">
              Answer {status} as a file: {operation.files.join(', ')}
            </p>
          )}
          {answer.length === 0 && operation.files.length === 0 && (
            <p className="text-note">Answer {status}, without content</p>
          )}
          <p className="text-note">
            Refusals:{' '}
            {operation.refusals.map((refusal) => (
              <Link
                key={refusal}
                href={`/api-guide#refusal-${refusal}`}
                className="mr-2.5 inline-block py-1"
              >
                {refusal}
              </Link>
            ))}
          </p>
        </div>
        {operation.example !== null && (
          <div className="flex min-w-0 flex-col gap-4">
            <Snippet language="curl" text={operation.example.curl} />
            <Snippet language="Python 3, standard library" text={operation.example.python} />
          </div>
        )}
      </div>
    </section>
  );
}
