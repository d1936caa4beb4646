'use client';

import { Button } from '@/components/ui/button';

export default function ErrorPage({
  error,
  reset,
}: {
  error: Error & { digest?: string };
  reset(): void;
}) {
  return (
    <main id="main" className="mx-auto max-w-[1440px] px-[22px] py-16 lg:px-10">
      <h1 className="font-light text-[34px] leading-[1.12]">This page could not be made</h1>
      <p className="mt-3 text-ink2">
        Nothing was changed. The server&apos;s log has the reason
        {error.digest ? ` under ${error.digest}` : ''}.
      </p>
      <p className="mt-6">
        <Button onClick={reset}>Try again</Button>
      </p>
    </main>
  );
}
