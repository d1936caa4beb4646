import { Button } from '@/components/ui/button';
import { Link } from '@/components/ui/link';
import { SectionOpener } from '@/components/ui/section-opener';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { TextField } from '@/components/ui/text-field';
import type { GuideGroup } from '@/lib/schemas/api-guide';
import { apiProblems } from '@/lib/schemas/api-problems';
import { ApiPath } from './api-path';

/** A form of the page itself, so that a search has an address and needs no script. */
export function GuideSearch({ words }: { words: string }) {
  return (
    <search>
      <form action="/api-guide" className="flex max-w-[440px] items-end gap-2">
        <div className="min-w-0 grow">
          <TextField
            label="Words of an address or a summary"
            type="search"
            name="q"
            defaultValue={words}
          />
        </div>
        <Button type="submit">Search</Button>
      </form>
    </search>
  );
}

/** Every operation in a line, by noun. */
export function GuideContents({ groups }: { groups: readonly GuideGroup[] }) {
  return (
    <div className="gap-x-14 lg:columns-2">
      {groups.map(({ noun, title, operations }) => (
        <section key={noun} className="mb-10 min-w-0 break-inside-avoid">
          <SectionOpener title={<Link href={`/api-guide/${noun}`}>{title}</Link>} />
          <ul>
            {operations.map(({ id, method, path, summary }) => (
              <li key={id} className="border-rule border-b py-1.5">
                <Link href={`/api-guide/${noun}#${id}`} className="block py-1 font-semibold">
                  {summary}
                </Link>
                <code className="break-words text-ink3 text-note">
                  {method} <ApiPath path={path} />
                </code>
              </li>
            ))}
          </ul>
        </section>
      ))}
    </div>
  );
}

const rules = [
  [
    'Token',
    'Authorization: Bearer rb_… reaches one collaboration, with your roles and its scopes.',
  ],
  [
    'Limits',
    'RateLimit and RateLimit-Policy on each answer say what is left and until when; a 429 carries Retry-After.',
  ],
  [
    'Unchanged',
    'JSON that is read carries an ETag. If-None-Match answers 304 while it is the same; If-Match on PATCH and DELETE answers 412 once it is not. Comparison and change are one step, so that of two people who read the same state one is refused.',
  ],
  [
    'Sent twice',
    'An Idempotency-Key on a POST gives a second sending the first answer, for 24 hours. Uploads and answers that are told once take none.',
  ],
  [
    'Long lists',
    'limit is 1 to 500. Link: rel="next" leads on and is absent on the last page. A list goes on from its last row, so that each row comes once; where that row is gone the answer is 400 cursor-gone. Jobs, whose order moves, go on by count.',
  ],
] as const;

/** What holds of every address alike. */
export function GuideRules() {
  return (
    <section className="min-w-0">
      <SectionOpener title="For every address" />
      <dl>
        {rules.map(([name, words]) => (
          <div
            key={name}
            className="grid gap-x-4 border-rule border-b py-2 sm:grid-cols-[8rem_1fr]"
          >
            <dt className="font-semibold">{name}</dt>
            <dd className="text-ink2 text-note">{words}</dd>
          </div>
        ))}
      </dl>
    </section>
  );
}

/** Statuses of problem documents, with the codes that come with them. */
export function GuideRefusals() {
  return (
    <section className="min-w-0">
      <SectionOpener title="Refusals" context="problem documents after RFC 9457" />
      <Table caption="Statuses of refusals and their codes">
        <TableHead>
          <Row>
            <HeadCell>status</HeadCell>
            <HeadCell>means</HeadCell>
            <HeadCell>code, among others</HeadCell>
          </Row>
        </TableHead>
        <TableBody>
          {apiProblems.map(({ status, means, codes }) => (
            <Row key={status} id={`refusal-${status}`}>
              <Cell isRowHead>{status}</Cell>
              <Cell className="min-w-48">{means}</Cell>
              <Cell>
                <code>{codes.join(', ')}</code>
              </Cell>
            </Row>
          ))}
        </TableBody>
      </Table>
    </section>
  );
}
