'use client';

import { usePathname, useRouter } from 'next/navigation';
import { startTransition } from 'react';
import { Button } from '@/components/ui/button';
import { LinkButton } from '@/components/ui/link-button';
import { PageTitle } from '@/components/ui/page-title';

export default function LabError({
  error,
  reset,
}: {
  error: Error & { digest?: string };
  reset(): void;
}) {
  const router = useRouter();
  const collaboration = usePathname().split('/')[1];
  const again = () =>
    startTransition(() => {
      router.refresh();
      reset();
    });
  return (
    <>
      <PageTitle title="This page could not be made" />
      <p className="text-ink2">
        Nothing was changed, and what was stored is kept. Try again; if it stays, whoever runs this
        server finds the reason in its log{error.digest ? ` under ${error.digest}` : ''}.
      </p>
      <div className="mt-6 flex flex-wrap gap-2">
        <Button variant="primary" onClick={again}>
          Try again
        </Button>
        <LinkButton href={`/${collaboration}`}>To the overview</LinkButton>
      </div>
    </>
  );
}
