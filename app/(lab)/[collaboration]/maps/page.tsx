import type { Metadata } from 'next';
import { currentActor } from '@/app/session';
import { MapStoreScreen } from '@/components/maps/map-store-screen';
import { readMapStore } from '@/lib/services/maps';

export const metadata: Metadata = { title: 'Completeness maps' };

export default async function MapsPage({ params }: { params: Promise<{ collaboration: string }> }) {
  const actor = await currentActor((await params).collaboration);
  return <MapStoreScreen collaboration={actor.collaboration} initial={await readMapStore(actor)} />;
}
