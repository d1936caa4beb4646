import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { OperationEntry } from '@/components/api/operation-entry';
import { PageTitle } from '@/components/ui/page-title';
import { apiGuide } from '../guide';

type Params = { params: Promise<{ noun: string }> };

async function groupOf({ params }: Params) {
  const { noun } = await params;
  return apiGuide().groups.find((group) => group.noun === noun);
}

export async function generateMetadata(given: Params): Promise<Metadata> {
  const group = await groupOf(given);
  return { title: group ? `${group.title}, API` : 'API' };
}

export default async function ApiNounPage(given: Params) {
  const group = await groupOf(given);
  if (!group) notFound();
  return (
    <>
      <PageTitle
        title={group.title}
        crumbs={[{ href: '/api-guide', label: 'API' }, { label: group.title }]}
      />
      <nav aria-label="On this page" className="mb-10">
        <ul className="grid gap-x-14 sm:grid-cols-2">
          {group.operations.map(({ id, summary }) => (
            <li key={id}>
              <a href={`#${id}`} className="inline-block py-1.5">
                {summary}
              </a>
            </li>
          ))}
        </ul>
      </nav>
      <div className="flex flex-col gap-12">
        {group.operations.map((operation) => (
          <OperationEntry key={operation.id} operation={operation} />
        ))}
      </div>
    </>
  );
}
