import type { MapReason, MapStanding } from '@/lib/schemas/map-states';

/** What keeps a map from being current, as the head of a count: "age changed, 3". */
export const reasonWords: Record<MapReason, string> = {
  engine: 'older engine',
  curve: 'curve changed',
  age: 'age changed',
  distance: 'distance changed',
  magnitude: 'magnitude changed',
  membership: 'membership changed',
  'stellar-companion': 'stellar companion changed',
  candidates: 'candidates changed',
  cooling: 'cooling relation changed',
  settings: 'map settings changed',
  grid: 'grid changed',
  uploaded: 'uploaded map in place of a computed one',
  'not-computed': 'not computed yet',
  other: 'other inputs',
};

export const standingWords: Record<MapStanding, string> = {
  current: 'current',
  stale: 'stale',
  missing: 'missing',
  failed: 'cannot be made',
  uploaded: 'as uploaded',
  none: 'no curve and no map',
};

/** "Stale: 3 age changed, 1 map settings changed". */
export function listReasons(reasons: { reason: MapReason; maps: number }[]): string {
  return [...reasons]
    .sort((a, b) => b.maps - a.maps)
    .map(({ reason, maps }) => `${maps} ${reasonWords[reason]}`)
    .join(', ');
}
