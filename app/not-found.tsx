import Link from 'next/link';

export default function NotFoundPage() {
  return (
    <main id="main" className="mx-auto max-w-[640px] px-[22px] py-24">
      <h1 className="font-light text-[34px]">No such page</h1>
      <p className="mt-3 text-ink2">
        The address leads nowhere, or to something that you are not a member of.
      </p>
      <p className="mt-6">
        <Link href="/">To your collaboration</Link>
      </p>
    </main>
  );
}
