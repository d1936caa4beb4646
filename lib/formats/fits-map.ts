import { dataOf, type Hdu, hduPlace, sidesOf, textOf } from './fits-hdu';
import { readFitsTable } from './fits-table';
import { uploadLimits } from './limits';
import type { MapCube, RawAxis } from './map-cube';
import type { FaultReport } from './reports';

/** The image that holds the maps: by name, else the only one of two or three dimensions. */
export function findMapImage(hdus: Hdu[], faults: FaultReport): Hdu | null {
  const images = hdus.filter(
    ({ kind, cards }) => kind === 'image' && [2, 3].includes(cards.get('NAXIS') as number),
  );
  const named = images.filter(({ name }) => name === 'COMPLETENESS');
  const [found] = named.length > 0 ? named : images;
  if (named.length === 1 || images.length === 1) return found;
  faults.add({
    code: images.length === 0 ? 'no-map' : 'choose-image',
    found: images.length === 0 ? 'no image of 2 or 3 dimensions' : `${images.length} images`,
    expected: 'one named COMPLETENESS',
  });
  return null;
}

const getters: Record<number, [bytes: number, get: (view: DataView, at: number) => number]> = {
  8: [1, (view, at) => view.getUint8(at)],
  16: [2, (view, at) => view.getInt16(at)],
  32: [4, (view, at) => view.getInt32(at)],
  64: [8, (view, at) => Number(view.getBigInt64(at))],
  [-32]: [4, (view, at) => view.getFloat32(at)],
  [-64]: [8, (view, at) => view.getFloat64(at)],
};

function readPixels(view: DataView, hdu: Hdu, count: number): Float64Array {
  const bitpix = hdu.cards.get('BITPIX') as number;
  const [width, get] = getters[bitpix];
  const scale = Number(hdu.cards.get('BSCALE') ?? 1);
  const zero = Number(hdu.cards.get('BZERO') ?? 0);
  const blank = bitpix > 0 ? hdu.cards.get('BLANK') : undefined;
  return Float64Array.from({ length: count }, (_, i) => {
    const value = get(view, i * width);
    return value === blank ? Number.NaN : value * scale + zero;
  });
}

/** Maps of a FITS file: an image with its axes, and its targets, in tables beside it. */
export function readFitsMaps(
  bytes: Uint8Array,
  hdus: Hdu[],
  image: Hdu,
  faults: FaultReport,
): MapCube | null {
  const sides = sidesOf(image, faults);
  if (sides === null) return null;
  const [columns, rows, targets = 1] = sides;
  const most = uploadLimits.mapSideMax;
  if (columns > most || rows > most) {
    faults.add({
      code: 'too-large',
      ...hduPlace(image, columns > most ? 'NAXIS1' : 'NAXIS2'),
      found: `${columns} x ${rows} pixels`,
      expected: `at most ${most} x ${most} for a map`,
    });
    return null;
  }
  const view = dataOf(bytes, image, faults);
  if (view === null) return null;
  const mass = readAxis(bytes, hdus, 'MASS', faults);
  const semiMajorAxis = readAxis(bytes, hdus, 'SEMI_MAJOR_AXIS', faults);
  const names = readNames(bytes, hdus, image, faults);
  if (faults.count > 0) return null;
  return {
    values: readPixels(view, image, columns * rows * targets),
    shape: [targets, rows, columns],
    mass,
    semiMajorAxis,
    targets: names.list,
    shapePlace: hduPlace(image),
    targetsPlace: names.place,
    place: (target, massIndex, axisIndex) => {
      const pixel = [axisIndex + 1, massIndex + 1, ...(targets > 1 ? [target + 1] : [])];
      return { item: `HDU ${image.number}, pixel (${pixel.join(', ')})` };
    },
    axisWords: { mass: 'table MASS', semiMajorAxis: 'table SEMI_MAJOR_AXIS' },
  };
}

function readAxis(
  bytes: Uint8Array,
  hdus: Hdu[],
  name: string,
  faults: FaultReport,
): RawAxis | null {
  const hdu = hdus.find((one) => one.kind === 'table' && one.name === name);
  const table = hdu && readFitsTable(bytes, hdu, most, faults);
  if (!hdu || !table) return null;
  const [column] = table.columns;
  return {
    values: column?.cells.map((cell) => (cell === null ? Number.NaN : Number(cell))) ?? [],
    unit: column?.unit ?? null,
    unitPlace: hduPlace(hdu, 'TUNIT1'),
    place: (index) => ({ item: `HDU ${hdu.number}`, row: index + 1 }),
  };
}
const most = 10_000;

function readNames(bytes: Uint8Array, hdus: Hdu[], image: Hdu, faults: FaultReport) {
  const hdu = hdus.find((one) => one.kind === 'table' && one.name === 'TARGETS');
  const table = hdu && readFitsTable(bytes, hdu, uploadLimits.mapTargets, faults);
  if (hdu && table) {
    const column =
      table.columns.find(({ heading }) => heading.toLowerCase() === 'target') ?? table.columns[0];
    return { list: column?.cells.map(String) ?? [], place: hduPlace(hdu) };
  }
  const object = textOf(image, 'OBJECT');
  return { list: object === null ? null : [object], place: hduPlace(image, 'OBJECT') };
}
