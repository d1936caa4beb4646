import {
  dataspaceMessage,
  datatypeMessage,
  Fields,
  type Hdf5Type,
  lookup3,
  objectHeader,
  textAttribute,
} from './hdf5-messages';
import {
  bytesOf,
  bytesPerValue,
  floatBytes,
  mapBytes,
  shapeOf,
  valueCount,
  type WrittenBytes,
  type WrittenMaps,
} from './written-maps';

const SUPERBLOCK = 48;
/** Message types of the HDF5 file format specification 3.0, IV.A.2. */
const message = {
  dataspace: 0x01,
  linkInfo: 0x02,
  datatype: 0x03,
  fillValue: 0x05,
  link: 0x06,
  layout: 0x08,
  groupInfo: 0x0a,
  attribute: 0x0c,
} as const;

interface Dataset {
  name: string;
  type: Hdf5Type;
  shape: readonly number[];
  unit: string | null;
  content: WrittenBytes;
}

function superblock(root: number, end: number): Uint8Array {
  const fields = new Fields()
    .raw(Uint8Array.of(0x89, 0x48, 0x44, 0x46, 0x0d, 0x0a, 0x1a, 0x0a))
    .bytes(2, 8, 8, 0)
    .uint64(0)
    .uint64(null)
    .uint64(end)
    .uint64(root)
    .build();
  return new Fields().raw(fields).uint32(lookup3(fields)).build();
}

/** A dataset in one piece, at an address. */
function datasetHeader({ type, shape, unit, content }: Dataset, address: number): Uint8Array {
  const layout = new Fields().bytes(3, 1).uint64(address).uint64(content.size).build();
  return objectHeader([
    [message.dataspace, dataspaceMessage(shape)],
    [message.datatype, datatypeMessage(type)],
    [message.fillValue, Uint8Array.of(3, 0x0a)],
    [message.layout, layout],
    ...(unit === null ? [] : [[message.attribute, textAttribute('unit', unit)] as const]),
  ]);
}

function groupHeader(
  links: readonly { name: string; address: number }[],
  attributes: WrittenMaps['provenance'],
): Uint8Array {
  return objectHeader([
    [message.linkInfo, new Fields().bytes(0, 0).uint64(null).uint64(null).build()],
    [message.groupInfo, Uint8Array.of(0, 0)],
    ...links.map(
      ({ name, address }) =>
        [
          message.link,
          new Fields().bytes(1, 0, name.length).text(name).uint64(address).build(),
        ] as const,
    ),
    ...attributes.map(([name, text]) => [message.attribute, textAttribute(name, text)] as const),
  ]);
}

function textDataset(name: string, texts: readonly string[]): Dataset {
  const encoded = texts.map((text) => new TextEncoder().encode(text));
  const textBytes = Math.max(1, ...encoded.map((bytes) => bytes.length));
  const content = new Uint8Array(textBytes * texts.length);
  encoded.forEach((bytes, i) => {
    content.set(bytes, i * textBytes);
  });
  return {
    name,
    type: { textBytes },
    shape: [texts.length],
    unit: null,
    content: bytesOf(content),
  };
}

const axisDataset = (name: string, values: readonly number[], unit: string): Dataset => ({
  name,
  type: 'float64',
  shape: [values.length],
  unit,
  content: bytesOf(floatBytes(values, 'float64', true)),
});

const aligned = (address: number) => Math.ceil(address / 8) * 8;

/**
 * Maps as HDF5: the datasets completeness, mass, semi_major_axis and, of stars, target, each in one
 * piece at the top level, so that the file can be made as it is sent. Axes have the attribute
 * `unit`; where the maps come from is told by attributes of the file.
 *
 * @see https://support.hdfgroup.org/documentation/hdf5/latest/_f_m_t3.html
 */
export function hdf5OfMaps(maps: WrittenMaps): WrittenBytes {
  const { massMjup, semiMajorAxisAu, targets, format } = maps;
  const datasets: Dataset[] = [
    {
      name: 'completeness',
      type: format,
      shape: shapeOf(maps),
      unit: null,
      content: {
        size: valueCount(maps) * bytesPerValue[format],
        parts: () => mapBytes(maps, true),
      },
    },
    axisDataset('mass', massMjup, 'Mjup'),
    axisDataset('semi_major_axis', semiMajorAxisAu, 'AU'),
    ...(targets === null ? [] : [textDataset('target', targets)]),
  ];
  const attributes = [['title', maps.title] as const, ...maps.provenance];
  // Headers are as long whatever addresses they hold.
  const rootSize = groupHeader(
    datasets.map(({ name }) => ({ name, address: 0 })),
    attributes,
  ).length;
  let address = aligned(SUPERBLOCK + rootSize);
  const headersAt = datasets.map((dataset) => {
    const here = address;
    address = aligned(address + datasetHeader(dataset, 0).length);
    return here;
  });
  const contentAt = datasets.map(({ content }) => {
    const here = address;
    address = aligned(address + content.size);
    return here;
  });
  const links = datasets.map(({ name }, i) => ({ name, address: headersAt[i] }));
  const size = address;
  const head = new Uint8Array(contentAt[0]);
  head.set(superblock(SUPERBLOCK, size));
  head.set(groupHeader(links, attributes), SUPERBLOCK);
  datasets.forEach((dataset, i) => {
    head.set(datasetHeader(dataset, contentAt[i]), headersAt[i]);
  });
  return {
    size,
    async *parts() {
      yield head;
      for (const { content } of datasets) {
        yield* content.parts();
        yield new Uint8Array(aligned(content.size) - content.size);
      }
    },
  };
}
