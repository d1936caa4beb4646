'use client';

import { useRouter } from 'next/navigation';
import { apiPath, withQuery } from '@/components/hooks/api-path';
import { Link } from '@/components/ui/link';
import { LinkButton } from '@/components/ui/link-button';
import { PageTitle } from '@/components/ui/page-title';
import { SelectField } from '@/components/ui/select-field';
import { TextField } from '@/components/ui/text-field';
import type { AuditPage } from '@/lib/schemas/audit';
import { LogTable } from './log-table';

/** As the address of the page holds it: days, not moments. */
export interface LogFilter {
  action?: string;
  person?: string;
  item?: string;
  from?: string;
  to?: string;
}

interface LogScreenProps {
  collaboration: string;
  page: AuditPage;
  filter: LogFilter;
  /** The same with moments, as the API takes it. */
  apiFilter: Record<string, string | undefined>;
  offset: number;
  pageSize: number;
  choices: { actions: string[]; people: { id: string; name: string }[] };
  /** False where the server does not know where requests come from. */
  knowsAddresses: boolean;
}

/** The owners' log: it only grows, and goes out as a file. */
export function LogScreen(props: LogScreenProps) {
  const { collaboration, page, filter, apiFilter, offset, pageSize, choices } = props;
  const router = useRouter();
  const base = `/${collaboration}/log`;
  const address = (change: LogFilter & { offset?: number }) =>
    withQuery(base, { ...filter, ...change });
  const go = (change: LogFilter) => router.push(address(change), { scroll: false });
  const file = (format: 'csv' | 'json') =>
    withQuery(apiPath(collaboration, 'audit', 'export'), { ...apiFilter, format });
  const last = Math.min(offset + page.entries.length, page.total);
  const isFiltered = Object.values(filter).some((value) => value !== undefined);
  return (
    <>
      <PageTitle
        title="Log"
        context="Who did what, when, from where; nothing in it can be changed or taken out"
        actions={
          <>
            <LinkButton href={file('csv')} icon="download" isDownload>
              CSV
            </LinkButton>
            <LinkButton href={file('json')} icon="download" isDownload>
              JSON
            </LinkButton>
          </>
        }
      />
      <div className="mb-4 grid gap-x-4 gap-y-3 md:grid-cols-4 xl:max-w-[1000px]">
        <SelectField
          label="Person"
          value={filter.person ?? ''}
          onChange={({ target }) => go({ person: target.value || undefined })}
          options={[
            { value: '', label: 'everybody' },
            ...choices.people.map(({ id, name }) => ({ value: id, label: name })),
          ]}
        />
        <SelectField
          label="Action"
          value={filter.action ?? ''}
          onChange={({ target }) => go({ action: target.value || undefined })}
          options={[
            { value: '', label: 'all actions' },
            ...choices.actions.map((value) => ({ value, label: value.replaceAll('-', ' ') })),
          ]}
        />
        <TextField
          label="From"
          type="date"
          defaultValue={filter.from ?? ''}
          onChange={({ target }) => go({ from: target.value || undefined })}
        />
        <TextField
          label="To"
          type="date"
          defaultValue={filter.to ?? ''}
          onChange={({ target }) => go({ to: target.value || undefined })}
        />
      </div>
      <p className="mb-2 text-ink2 text-note">
        {page.total === 0 ? 'No entry' : `${offset + 1} to ${last} of ${page.total} entries`}
        {isFiltered && (
          <>
            {' '}
            that the filters leave. <Link href={base}>Show all</Link>
          </>
        )}
      </p>
      {page.entries.length > 0 && (
        <LogTable
          collaboration={collaboration}
          entries={page.entries}
          onlyItem={(item) => address({ item })}
        />
      )}
      {!props.knowsAddresses && (
        <p className="mt-3 text-ink3 text-note">
          Where requests come from is noted only where a proxy of your own tells the server; see
          RAREBOUND_BEHIND_PROXY in the guide.
        </p>
      )}
      <nav aria-label="Pages of the log" className="mt-4 flex gap-4">
        {offset > 0 && (
          <LinkButton href={address({ offset: Math.max(0, offset - pageSize) })} icon="back">
            Newer
          </LinkButton>
        )}
        {last < page.total && (
          <LinkButton href={address({ offset: offset + pageSize })} icon="next">
            Older
          </LinkButton>
        )}
      </nav>
    </>
  );
}
