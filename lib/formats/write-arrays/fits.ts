import {
  type Card,
  FITS_BLOCK,
  FitsSum,
  fitsPadding,
  headerWithSums,
  primaryUnit,
} from '../write-fits/blocks';
import { tableUnit } from '../write-fits/table';
import { asciiText } from '../write-tables/ascii';
import type { WrittenColumn } from '../write-tables/written-table';
import {
  bytesPerValue,
  mapBytes,
  shapeOf,
  valueCount,
  type WrittenBytes,
  type WrittenMaps,
} from './written-maps';

const massColumn = (values: readonly number[]): WrittenColumn => ({
  name: 'mass',
  type: 'number',
  description: 'Companion mass of each row of the image',
  measures: 'companion mass',
  ucd: 'phys.mass',
  values,
});
const axisColumn = (values: readonly number[]): WrittenColumn => ({
  name: 'semi_major_axis',
  type: 'number',
  description: 'Semi-major axis of each column of the image',
  measures: 'semi-major axis',
  ucd: 'phys.size.smajAxis',
  values,
});
const targetColumn = (values: readonly string[]): WrittenColumn => ({
  name: 'target',
  type: 'text',
  description: 'Star of each plane of the image',
  ucd: 'meta.id;meta.main',
  values,
});

/** Comments of the image, as sentences. */
const comments = [
  'Probability to detect a companion, by mass and semi-major axis. Both axes are given as',
  'tables of this file; there is no world coordinate system.',
].join(' ');

/**
 * Maps as FITS: the image COMPLETENESS (semi-major axis fastest, then mass, then target) with its
 * axes in the tables MASS, SEMI_MAJOR_AXIS and TARGETS. The maps are read twice, once for the
 * checksum that stands before them.
 */
export function fitsOfMaps(maps: WrittenMaps): WrittenBytes {
  const { massMjup, semiMajorAxisAu, targets, isCube, format } = maps;
  const sides = [...shapeOf(maps)].reverse();
  const only = !isCube && targets !== null ? targets[0] : null;
  const cards: Card[] = [
    { keyword: 'XTENSION', value: 'IMAGE', comment: 'image' },
    { keyword: 'BITPIX', value: -8 * bytesPerValue[format] },
    { keyword: 'NAXIS', value: sides.length },
    ...sides.map((side, i) => ({ keyword: `NAXIS${i + 1}`, value: side })),
    { keyword: 'PCOUNT', value: 0 },
    { keyword: 'GCOUNT', value: 1 },
    { keyword: 'EXTNAME', value: 'COMPLETENESS' },
    ...(only === null ? [] : [{ keyword: 'OBJECT', value: only }]),
    { comment: comments },
  ];
  const before = primaryUnit([
    maps.title,
    ...maps.provenance.map(([name, text]) => `${name}: ${text}`),
    'Mjup is the mass of Jupiter, GM = 1.2668653e17 m3 s-2 (IAU 2015 B3).',
  ]);
  const after = Buffer.concat([
    tableUnit('MASS', [massColumn(massMjup)]),
    tableUnit('SEMI_MAJOR_AXIS', [axisColumn(semiMajorAxisAu)]),
    ...(isCube && targets !== null
      ? [tableUnit('TARGETS', [targetColumn(targets.map(asciiText))])]
      : []),
  ]);
  const dataSize = valueCount(maps) * bytesPerValue[format];
  const headerSize = headerWithSums(cards, 0).length;
  const padded = Math.ceil(dataSize / FITS_BLOCK) * FITS_BLOCK;
  return {
    size: before.length + headerSize + padded + after.length,
    async *parts() {
      const sum = new FitsSum();
      for await (const part of mapBytes(maps, false)) sum.add(part);
      yield before;
      yield headerWithSums(cards, sum.value);
      yield* mapBytes(maps, false);
      yield fitsPadding(dataSize);
      yield after;
    },
  };
}
