import type { Metadata } from 'next';
import { currentActor } from '@/app/session';
import { ReleaseScreen } from '@/components/releases/release-screen';
import { getDeposit } from '@/lib/services/deposits/deposits';
import { addressOfRelease } from '@/lib/services/releases/address';
import { listGuestLinks } from '@/lib/services/releases/guest-links';
import { foundRelease } from '../found-release';

interface PageProps {
  params: Promise<{ collaboration: string; release: string }>;
}

export async function generateMetadata({ params }: PageProps): Promise<Metadata> {
  return { title: (await params).release };
}

export default async function ReleasePage({ params }: PageProps) {
  const { collaboration, release: key } = await params;
  const actor = await currentActor(collaboration);
  const release = await foundRelease(actor, key);
  const [{ links }, deposit] = await Promise.all([
    listGuestLinks(actor),
    getDeposit(actor, release.id),
  ]);
  return (
    <ReleaseScreen
      key={release.id}
      collaboration={actor.collaboration}
      initial={release}
      links={links}
      deposit={deposit}
      address={addressOfRelease(release.code)}
    />
  );
}
