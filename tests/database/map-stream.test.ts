import { createHash } from 'node:crypto';
import { beforeAll, describe, expect, it } from 'vitest';
import { encodeMap } from '@/lib/sensitivity';
import { CollaborationRow, CompletenessMapRow, database, inTransaction } from '@/models';
import { valuesOnGrid } from '@/models/map-on-grid';
import { MissingMap, type PassingMap, streamMaps } from '@/models/map-stream';
import { packMap } from '@/models/map-values';

const digestOf = (text: string) => createHash('sha256').update(text).digest('hex');

async function storeMaps(slug: string, count: number) {
  const { id: collaborationId } = await CollaborationRow.create({ slug, name: slug });
  const rows = await CompletenessMapRow.bulkCreate(
    Array.from({ length: count }, (_, i) => {
      // Neighbours alike and then not, so that no axis of the one before is taken over.
      const columns = i % 5 < 3 ? 4 : 3;
      const completeness = Float64Array.from({ length: 2 * columns }, (_, k) => (k + i) / 100);
      return {
        collaborationId,
        digest: digestOf(`${slug} ${i}`),
        origin: 'computed' as const,
        engineVersion: '1',
        massMjup: [1 + i / 7, 20],
        semiMajorAxisAu: Array.from({ length: columns }, (_, k) => 0.1 * (k + 1)),
        ...packMap(completeness),
        inputs: {},
        report: { flaggedMassNodes: i % 2 === 0 ? [1] : [], words: `“µ” ${i}` },
      };
    }),
  );
  return { collaborationId, rows };
}

const copyOf = (map: PassingMap) => ({
  ...map,
  massMjup: [...map.massMjup],
  semiMajorAxisAu: [...map.semiMajorAxisAu],
  encoded: [...map.encoded],
});

beforeAll(() => {
  database();
});

describe('streamMaps(collaborationId, keys)', () => {
  it('gives the rows that the models read, to the last bit, in the order of the keys', async () => {
    const { collaborationId } = await storeMaps('stream', 23);
    const rows = await CompletenessMapRow.findAll({
      where: { collaborationId },
      order: [['checksum', 'ASC']],
    });
    const asked = [...rows, rows[3]];
    for (const by of ['id', 'digest'] as const) {
      const passed: ReturnType<typeof copyOf>[] = [];
      const places: number[] = [];
      await streamMaps(collaborationId, { by, keys: asked.map((row) => row[by]) }, (map, place) => {
        passed.push(copyOf(map));
        places.push(place);
      });
      expect(places).toEqual(asked.map((_, i) => i));
      expect(passed).toEqual(
        asked.map((row) => ({
          id: row.id,
          digest: row.digest,
          checksum: row.checksum,
          report: row.report,
          massMjup: row.massMjup,
          semiMajorAxisAu: row.semiMajorAxisAu,
          encoded: Array.from({ length: row.nodeValues.length / 2 }, (_, i) =>
            row.nodeValues.readUInt16LE(2 * i),
          ),
        })),
      );
    }
  });

  it('lays a map on another grid and leaves it as it is on its own', async () => {
    const { collaborationId, rows } = await storeMaps('grids', 1);
    await streamMaps(collaborationId, { by: 'id', keys: [rows[0].id] }, (map) => {
      expect(valuesOnGrid(map, map)).toBe(map.encoded);
      const copy = { ...map, massMjup: map.massMjup.map((mass, i) => (i === 0 ? mass : 10)) };
      const other = valuesOnGrid(map, copy);
      expect([...other.subarray(0, 4)]).toEqual([...map.encoded.subarray(0, 4)]);
      // Linear in ln m between the two rows of nodes, from the decoded values.
      const share = Math.log(10 / map.massMjup[0]) / Math.log(20 / map.massMjup[0]);
      const [below, above] = [map.encoded[0] / 65_535, map.encoded[4] / 65_535];
      const [expected] = encodeMap(Float64Array.of((1 - share) * below + share * above));
      expect(other[4]).toBe(expected);
    });
  });

  it("names the first key without a map, another collaboration's among them", async () => {
    const own = await storeMaps('own', 3);
    const foreign = await storeMaps('foreign', 1);
    const keys = [own.rows[0].id, foreign.rows[0].id, own.rows[1].id];
    const seen: string[] = [];
    const reading = streamMaps(own.collaborationId, { by: 'id', keys }, ({ id }) => seen.push(id));
    await expect(reading).rejects.toThrow(new MissingMap(foreign.rows[0].id).message);
    expect(seen).toEqual([own.rows[0].id]);
    const last = streamMaps(
      own.collaborationId,
      { by: 'digest', keys: [own.rows[2].digest, "'; drop table target; --"] },
      () => undefined,
    );
    await expect(last).rejects.toThrow(MissingMap);
    const places: number[] = [];
    const keep = (_: PassingMap, place: number) => places.push(place);
    await streamMaps(own.collaborationId, { by: 'id', keys, gaps: 'skip' }, keep);
    expect(places).toEqual([0, 2]);
  });

  it('leaves its connection fit for the next question after a failure', async () => {
    const { collaborationId, rows } = await storeMaps('failures', 40);
    const keys = rows.map(({ id }) => id);
    for (let i = 0; i < 15; i++) {
      const reading = streamMaps(collaborationId, { by: 'id', keys }, () => {
        throw new RangeError('no more');
      });
      await expect(reading).rejects.toThrow('no more');
    }
    const notAnId = streamMaps(collaborationId, { by: 'id', keys: ['x'] }, () => undefined);
    await expect(notAnId).rejects.toThrow(/uuid/);
    expect(await CompletenessMapRow.count({ where: { collaborationId } })).toBe(40);
  });

  it('sees what its transaction has written', async () => {
    await inTransaction(async (transaction) => {
      const { id: collaborationId } = await CollaborationRow.create(
        { slug: 'inside', name: 'inside' },
        { transaction },
      );
      const row = await CompletenessMapRow.create(
        {
          collaborationId,
          digest: digestOf('inside'),
          origin: 'computed',
          engineVersion: '1',
          massMjup: [1, 2],
          semiMajorAxisAu: [1, 2],
          ...packMap(Float64Array.of(0, 0.5, 1, 0.25)),
          inputs: {},
        },
        { transaction },
      );
      const values: number[][] = [];
      const keys = [row.id];
      const keep = ({ encoded }: PassingMap) => values.push([...encoded]);
      await streamMaps(collaborationId, { by: 'id', keys }, keep, transaction);
      expect(values).toEqual([[0, 32_768, 65_535, 16_384]]);
    });
  });
});
