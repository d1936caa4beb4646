import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  collectBytes,
  fitsOfMaps,
  hdf5OfMaps,
  jsonOfMap,
  npyOfMaps,
  npzOfMaps,
  readUploadedFile,
  type WrittenMaps,
} from '@/lib/formats';
import { lookup3 } from '@/lib/formats/write-arrays/hdf5-messages';
import { encodeChecksum } from '@/lib/formats/write-fits/blocks';

const writers = { npz: npzOfMaps, h5: hdf5OfMaps, fits: fitsOfMaps } as const;

interface Drawn {
  massMjup: number[];
  semiMajorAxisAu: number[];
  maps: number[][];
}

const axis = (min: number) =>
  fc
    .uniqueArray(fc.double({ min, max: 1e300, noNaN: true }), { minLength: 2, maxLength: 5 })
    .map((values) => values.sort((a, b) => a - b));
const drawn: fc.Arbitrary<Drawn> = fc
  .tuple(axis(1e-300), axis(1e-300), fc.integer({ min: 1, max: 4 }))
  .chain(([massMjup, semiMajorAxisAu, stars]) => {
    const size = massMjup.length * semiMajorAxisAu.length;
    const value = fc.double({ min: 0, max: 1, noNaN: true }).map((one) => one + 0);
    const map = fc.array(value, { minLength: size, maxLength: size });
    return fc
      .array(map, { minLength: stars, maxLength: stars })
      .map((maps) => ({ massMjup, semiMajorAxisAu, maps }));
  });

function mapsOf(
  { massMjup, semiMajorAxisAu, maps }: Drawn,
  targets: string[],
  rest: Pick<WrittenMaps, 'isCube' | 'format'>,
): WrittenMaps {
  return {
    title: 'Maps',
    massMjup,
    semiMajorAxisAu,
    targets,
    provenance: [['run', 'A-3, run 18 – é']],
    ...rest,
    async *maps() {
      yield* maps;
    },
  };
}

async function readBack(bytes: Uint8Array, ending: string) {
  const fileName = `maps.${ending}`;
  const read = await readUploadedFile(bytes, { fileName, kind: 'completeness-maps' });
  if (!read.ok) throw new Error(`${ending}: ${JSON.stringify(read.faults)}`);
  return read.records as {
    target: string;
    massMjup: number[];
    semiMajorAxisAu: number[];
    completeness: number[];
  }[];
}

describe('maps', () => {
  it.each(Object.keys(writers) as (keyof typeof writers)[])(
    'read back from %s: doubles to the last bit, floats to theirs',
    async (ending) => {
      await fc.assert(
        fc.asyncProperty(
          drawn,
          fc.boolean(),
          fc.constantFrom('float32' as const, 'float64' as const),
          async (cube, isCube, format) => {
            const kept = isCube ? cube.maps : cube.maps.slice(0, 1);
            const targets = kept.map((_, i) => `Star ${i}`);
            const written = mapsOf({ ...cube, maps: kept }, targets, { isCube, format });
            const content = writers[ending](written);
            const records = await readBack(await collectBytes(content), ending);
            expect(records.map(({ target }) => target)).toEqual(targets);
            const stored = format === 'float32' ? Math.fround : (value: number) => value;
            expect(records.map(({ completeness }) => completeness)).toEqual(
              kept.map((map) => map.map(stored)),
            );
            for (const { massMjup, semiMajorAxisAu } of records) {
              expect(massMjup).toEqual(cube.massMjup);
              expect(semiMajorAxisAu).toEqual(cube.semiMajorAxisAu);
            }
          },
        ),
        { numRuns: 25 },
      );
    },
  );

  it('of one star read back from JSON', async () => {
    await fc.assert(
      fc.asyncProperty(drawn, async (cube) => {
        const one = { ...cube, maps: cube.maps.slice(0, 1) };
        const written = mapsOf(one, ['Star é'], { isCube: false, format: 'float64' });
        const text = await jsonOfMap(written);
        const [record] = await readBack(new TextEncoder().encode(text), 'json');
        expect(record.target).toBe('Star é');
        expect(record.completeness).toEqual(one.maps[0]);
      }),
      { numRuns: 15 },
    );
  });

  it('are made one after the other, never all at once', async () => {
    let made = 0;
    const size = 4;
    const content = npyOfMaps({
      ...mapsOf({ massMjup: [1, 2], semiMajorAxisAu: [1, 2], maps: [] }, [], {
        isCube: true,
        format: 'float32',
      }),
      targets: Array.from({ length: 1000 }, (_, i) => `S ${i}`),
      async *maps() {
        for (; made < 1000; made += 1) yield new Float64Array(size);
      },
    });
    const parts = content.parts()[Symbol.asyncIterator]();
    await parts.next();
    await parts.next();
    expect(made).toBeLessThan(3);
    expect(content.size).toBe(128 + 1000 * size * 4);
  });

  it('that are fewer than promised are an error, not a short file', async () => {
    const one = mapsOf(
      { massMjup: [1, 2], semiMajorAxisAu: [1, 2], maps: [[0, 0, 0, 0]] },
      ['A', 'B'],
      {
        isCube: true,
        format: 'float64',
      },
    );
    await expect(collectBytes(hdf5OfMaps(one))).rejects.toThrow(RangeError);
  });
});

describe('checksums', () => {
  // https://burtleburtle.net/bob/c/lookup3.c, driver5: hashlittle("", 0, 0) and the next three.
  it('lookup3 gives the values of its author', () => {
    const text = new TextEncoder().encode('Four score and seven years ago');
    expect(lookup3(new Uint8Array())).toBe(0xdeadbeef);
    expect(lookup3(text)).toBe(0x17770551);
  });

  // FITS standard 4.0, appendix J.4: the sum 868229149 is written hcHjjc9ghcEghc9g.
  it('encodeChecksum gives the example of the standard', () => {
    expect(encodeChecksum(868_229_149)).toBe('hcHjjc9ghcEghc9g');
  });
});
