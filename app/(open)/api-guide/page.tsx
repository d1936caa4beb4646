import type { Metadata } from 'next';
import {
  GuideContents,
  GuideRefusals,
  GuideRules,
  GuideSearch,
} from '@/components/api/guide-contents';
import { Link } from '@/components/ui/link';
import { PageTitle } from '@/components/ui/page-title';
import { searchGuide } from '@/lib/schemas/api-guide';
import { apiGuide } from './guide';

export const metadata: Metadata = { title: 'API' };

export default async function ApiGuidePage({
  searchParams,
}: {
  searchParams: Promise<{ q?: string | string[] }>;
}) {
  const { q } = await searchParams;
  const words = (Array.isArray(q) ? q[0] : (q ?? '')).slice(0, 100);
  const { groups } = apiGuide();
  const found = searchGuide(groups, words);
  return (
    <>
      <PageTitle
        title="API"
        context={
          <>
            Each address of this server, made from the description at{' '}
            <a href="/api/v1/openapi.json">/api/v1/openapi.json</a>; the{' '}
            <Link href="/api-guide/shapes">shapes</Link> of bodies and answers.
          </>
        }
      />
      <div className="flex flex-col gap-10">
        <GuideSearch words={words} />
        {found.length > 0 ? (
          <GuideContents groups={found} />
        ) : (
          <p className="text-ink2">No address holds all of these words.</p>
        )}
        <div className="grid gap-x-14 gap-y-10 lg:grid-cols-2">
          <GuideRules />
          <GuideRefusals />
        </div>
      </div>
    </>
  );
}
