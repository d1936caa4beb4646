import { Icon } from '@/components/ui/icon';
import { LinkButton } from '@/components/ui/link-button';
import { PageTitle } from '@/components/ui/page-title';

interface NotAllowedProps {
  title: string;
  /** Who could, as a sentence. */
  fact: string;
  /** What the person can do instead. */
  instead: string;
  link: { href: string; label: string };
}

/** A page that is another role's: who may, what can be done instead, and the way there. */
export function NotAllowed({ title, fact, instead, link }: NotAllowedProps) {
  return (
    <>
      <PageTitle title={title} />
      <div className="grid max-w-[640px] grid-cols-[24px_1fr] gap-x-4 py-4">
        <Icon name="lock" size={20} />
        <div>
          <p className="font-semibold">{fact}</p>
          <p className="text-ink2">{instead}</p>
          <div className="mt-4">
            <LinkButton href={link.href}>{link.label}</LinkButton>
          </div>
        </div>
      </div>
    </>
  );
}
