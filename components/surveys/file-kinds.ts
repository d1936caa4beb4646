import type { UploadKindName } from '@/lib/schemas/uploads';

/** What a file may hold, and which columns it needs, in the words of the form. */
export const fileKinds: { kind: UploadKindName; label: string; needs: string }[] = [
  {
    kind: 'targets',
    label: 'targets',
    needs:
      'name; distance [pc] or parallax [mas], age [Myr], each with its error; mag_H [mag] and the like in the band of the curves. gaia_dr3_id, ra, dec, mass, spectral_type and moving_group are kept too.',
  },
  {
    kind: 'contrast-curves',
    label: 'contrast curves',
    needs:
      'target, separation [arcsec], contrast [mag], band; epoch, n_sigma (default 5) and coverage if known.',
  },
  {
    kind: 'completeness-maps',
    label: 'ready maps',
    needs:
      'Long: target, mass [Mjup], semi_major_axis [AU], completeness from 0 to 1. Wide: semi-major axes in the first line, masses in the first column, one star a file.',
  },
  {
    kind: 'companions',
    label: 'companions',
    needs:
      'target, companion, status (confirmed, candidate, ambiguous, background); mass [Mjup] and semi_major_axis [AU] with errors for confirmed ones and candidates. A file without rows states zero detections.',
  },
  {
    kind: 'cooling-tables',
    label: 'cooling table',
    needs:
      'age [Myr], mass [Mjup] and mag_H [mag] or other bands; one row a pair, gaps are kept as gaps.',
  },
];
