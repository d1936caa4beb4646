import type { UploadKindName } from '@/lib/schemas/uploads';

export interface FileKind {
  kind: UploadKindName;
  label: string;
  /** Columns without which the file says nothing; alternatives stand in one entry. */
  needs: string[];
  /** Columns that are read too where the file has them. */
  takes: string[];
  /** Endings of the files that can hold it; the content decides, whatever the name. */
  containers: string;
  /** What is not plain from the columns. */
  note: string;
  /** A file of twelve invented stars, to try the way with. */
  sample?: string;
}

export const tableContainers = 'CSV, TSV, ECSV, VOTable (.vot, .xml), FITS, JSON';

/** What a file may hold, and which columns it needs, in the words of the form. */
export const fileKinds: FileKind[] = [
  {
    kind: 'targets',
    label: 'targets',
    needs: ['name', 'distance [pc] or parallax [mas]', 'age [Myr]', 'mag_H [mag], mag_K …'],
    takes: [
      'distance_error',
      'parallax_error',
      'age_error',
      'gaia_dr3_id',
      'ra',
      'dec',
      'mass',
      'spectral_type',
      'moving_group',
    ],
    containers: tableContainers,
    note: 'The magnitude is that of the star in the band of the curves. A star that another survey knows is matched by identifier or by position.',
    sample: 'targets.csv',
  },
  {
    kind: 'contrast-curves',
    label: 'contrast curves',
    needs: ['target', 'separation [arcsec]', 'contrast [mag]', 'band'],
    takes: ['epoch', 'n_sigma', 'coverage'],
    containers: tableContainers,
    note: 'One row a point, any number of stars a file. Contrast is at 5 σ unless n_sigma says otherwise.',
    sample: 'contrast-curves.csv',
  },
  {
    kind: 'completeness-maps',
    label: 'ready maps',
    needs: ['target', 'mass [Mjup]', 'semi_major_axis [AU]', 'completeness'],
    takes: [],
    containers: `${tableContainers}, NPY, NPZ, HDF5 (.h5, .hdf5)`,
    note: 'One row a cell, completeness from 0 to 1. Or as a table of one star: semi-major axes in the first line, masses in the first column. Or as arrays in NPY, NPZ, HDF5 or FITS, semi-major axis fastest.',
  },
  {
    kind: 'companions',
    label: 'companions',
    needs: ['target', 'companion', 'status', 'mass [Mjup]', 'semi_major_axis [AU]'],
    takes: ['mass_error', 'semi_major_axis_error', 'probability', 'reference'],
    containers: tableContainers,
    note: 'Status is confirmed, candidate, ambiguous or background; only confirmed ones can be detections. A file without rows states zero detections.',
    sample: 'companions.csv',
  },
  {
    kind: 'cooling-tables',
    label: 'cooling table',
    needs: ['age [Myr]', 'mass [Mjup]', 'mag_H [mag], mag_K …'],
    takes: [],
    containers: tableContainers,
    note: 'One row a pair of age and mass; gaps are kept as gaps. The table is there for all surveys of the collaboration.',
    sample: 'cooling-table.csv',
  },
];
