import {
  bytesOf,
  fitsOfMaps,
  hdf5OfMaps,
  jsonOfMap,
  npyOfMaps,
  npzOfMaps,
  type WrittenBytes,
  type WrittenMaps,
} from '@/lib/formats';

export const arrayEndings = ['npz', 'npy', 'h5', 'fits', 'json'] as const;
export type ArrayEnding = (typeof arrayEndings)[number];

export const arrayFormats: Record<
  ArrayEnding,
  { name: string; mediaType: string; audience: string }
> = {
  npz: {
    name: 'NPZ',
    mediaType: 'application/zip',
    audience: 'NumPy, with axes and names of stars',
  },
  npy: { name: 'NPY', mediaType: 'application/octet-stream', audience: 'NumPy, the values alone' },
  h5: { name: 'HDF5', mediaType: 'application/x-hdf5', audience: 'h5py, MATLAB, IDL, Julia' },
  fits: { name: 'FITS', mediaType: 'application/fits', audience: 'DS9, Astropy, archives' },
  json: { name: 'JSON', mediaType: 'application/json', audience: 'programs' },
};

/** Maps in one of their containers; JSON is for a single one. */
export async function mapsBytes(maps: WrittenMaps, ending: ArrayEnding): Promise<WrittenBytes> {
  switch (ending) {
    case 'npz':
      return npzOfMaps(maps);
    case 'npy':
      return npyOfMaps(maps);
    case 'h5':
      return hdf5OfMaps(maps);
    case 'fits':
      return fitsOfMaps(maps);
    case 'json':
      return bytesOf(new TextEncoder().encode(await jsonOfMap(maps)));
  }
}
