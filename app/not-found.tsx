import { Mark, Wordmark } from '@/components/ui/brand';
import { Link } from '@/components/ui/link';
import { Ruler } from '@/components/ui/log-ticks';

export default function NotFoundPage() {
  return (
    <>
      <header>
        <div className="mx-auto flex min-h-[58px] max-w-[1440px] items-center gap-[9px] px-[22px] lg:px-10">
          <Mark />
          <Wordmark />
        </div>
        <Ruler />
      </header>
      <main id="main" className="mx-auto max-w-[1440px] px-[22px] py-16 lg:px-10">
        <h1 className="font-light text-[34px] leading-[1.12]">No such page</h1>
        <p className="mt-3 max-w-[60ch] text-ink2">
          The address leads nowhere, or to something that you are not a member of. The two are not
          told apart.
        </p>
        <p className="mt-6 font-semibold">
          <Link href="/">To your collaboration</Link>
        </p>
      </main>
    </>
  );
}
