import { Link } from '@/components/ui/link';
import { SectionOpener } from '@/components/ui/section-opener';
import { useMoment } from '@/components/ui/time-zone';
import type { ActivityEntry } from '@/lib/schemas/activity';

/** Entries that stand together, one list a day. */
export function groupByDay(
  entries: readonly ActivityEntry[],
  dayOf: (moment: string) => string,
): { day: string; entries: ActivityEntry[] }[] {
  const days: { day: string; entries: ActivityEntry[] }[] = [];
  for (const entry of entries) {
    const day = dayOf(entry.at);
    const last = days[days.length - 1];
    if (last?.day === day) last.entries.push(entry);
    else days.push({ day, entries: [entry] });
  }
  return days;
}

/** A sentence that nobody begins starts with a capital, and one whose name stands in it is not told twice. */
function Sentence({ entry }: { entry: ActivityEntry }) {
  if (entry.person === null) return <>{entry.what}</>;
  return (
    <>
      <b className="font-semibold">
        <bdi>{entry.person.name}</bdi>
      </b>{' '}
      {entry.what}
    </>
  );
}

function Entry({ collaboration, entry }: { collaboration: string; entry: ActivityEntry }) {
  const moment = useMoment();
  const { item, excerpt } = entry;
  return (
    <li className="grid grid-cols-[52px_minmax(0,1fr)] gap-x-3 border-rule border-b py-2 md:grid-cols-[64px_minmax(0,1fr)_minmax(120px,220px)]">
      <time dateTime={entry.at} className="text-ink3 text-note">
        {moment(entry.at, 'clock')}
      </time>
      <div className="min-w-0 text-note [overflow-wrap:anywhere]">
        <Sentence entry={entry} />
        {excerpt !== null && (
          <p dir="auto" className="mt-0.5 w-fit max-w-full text-ink2 italic">
            {excerpt}
          </p>
        )}
      </div>
      {item !== null && (
        <div className="col-start-2 min-w-0 text-note md:col-start-3 md:text-right">
          {item.path === null ? (
            <span className="text-ink3">{item.label}</span>
          ) : (
            <Link
              href={`/${collaboration}${item.path}`}
              className="[overflow-wrap:anywhere] max-md:inline-flex max-md:min-h-11 max-md:items-center"
            >
              <bdi>{item.label}</bdi>
            </Link>
          )}
        </div>
      )}
    </li>
  );
}

export function ActivityDays({
  collaboration,
  entries,
}: {
  collaboration: string;
  entries: readonly ActivityEntry[];
}) {
  const moment = useMoment();
  return (
    <div className="mt-6 flex max-w-[960px] flex-col gap-8">
      {groupByDay(entries, (at) => moment(at, 'day')).map(({ day, entries: own }) => (
        <section key={day}>
          <SectionOpener title={day} />
          <ul>
            {own.map((entry) => (
              <Entry key={entry.id} collaboration={collaboration} entry={entry} />
            ))}
          </ul>
        </section>
      ))}
    </div>
  );
}
