import { spawn } from 'node:child_process';
import { createHash } from 'node:crypto';
import { statSync } from 'node:fs';
import path from 'node:path';
import { logSpacedAxis } from '@/lib/numerics/grid';
import { computeCompletenessMap, ENGINE_VERSION, type MapGrid } from '@/lib/sensitivity';
import { packMap } from '@/models/map-values';
import { COOLING, inventStar, settings } from '@/tests/bench/survey';
import { query } from '../founders';
import type { Bench, Laboratory, Measured, Row } from '../row';

const MOST_SECONDS = 300;
const NODES = 300;
const MAP_BYTES = 2 * NODES * NODES;
/** Maps that the engine makes; each is stored turned by some rows as often as it takes. */
const DISTINCT = 200;
const bytesWanted = () => Number(process.env.HARDEN_MAPS_GB ?? 1) * 2 ** 30;

const GRID: MapGrid = {
  massMjup: logSpacedAxis(0.5, 80, NODES),
  semiMajorAxisAu: logSpacedAxis(1, 1000, NODES),
};

const STORE = `
  insert into completeness_map (collaboration_id, digest, origin, engine_version, mass_mjup,
      semi_major_axis_au, node_values, checksum, inputs)
    values ($1, $2, 'computed', $3, $4, $5, $6, $7, '{}')`;

const TURN = `
  insert into completeness_map (collaboration_id, digest, origin, engine_version, mass_mjup,
      semi_major_axis_au, node_values, checksum, inputs)
    select collaboration_id, encode(sha256(digest::bytea || turned), 'hex'), origin, engine_version,
      mass_mjup, semi_major_axis_au, turned, encode(sha256(turned), 'hex'), inputs
    from (select m.*, substring(node_values from $1::int + 1) || substring(node_values for $1::int)
            as turned from completeness_map m order by created_at, id limit $2) t`;

/** As many maps as the bytes ask for, each of its own. @returns how many */
async function fill({ databaseUrl }: Laboratory): Promise<number> {
  const [{ id }] = await query<{ id: string }>(
    databaseUrl,
    `insert into collaboration (slug, name) values ('large', 'Large') returning id`,
  );
  for (let star = 0; star < DISTINCT; star++) {
    const { map } = computeCompletenessMap(inventStar(star), COOLING, GRID, settings('smooth'));
    const { nodeValues, checksum } = packMap(map.completeness);
    const digest = createHash('sha256').update(`map ${star}`).digest('hex');
    const axes = [[...GRID.massMjup], [...GRID.semiMajorAxisAu]];
    await query(databaseUrl, STORE, [id, digest, ENGINE_VERSION, ...axes, nodeValues, checksum]);
  }
  const wanted = Math.ceil(bytesWanted() / MAP_BYTES);
  for (let count = DISTINCT, turn = 1; count < wanted; count += DISTINCT, turn++) {
    const rows = Math.min(DISTINCT, wanted - count);
    await query(databaseUrl, TURN, [2 * NODES * turn, rows]);
  }
  return wanted;
}

const FINGERPRINT = `
  select count(*)::int as maps, sum(octet_length(node_values))::text as bytes,
    pg_total_relation_size('completeness_map')::text as stored,
    encode(sha256(string_agg(sha256(node_values), ''::bytea order by digest)), 'hex') as digest
  from completeness_map`;

interface Fingerprint {
  maps: number;
  bytes: string;
  stored: string;
  digest: string;
}

/** A command of the project on the laboratory, as a person gives it. @returns its seconds */
function command(root: string, name: string, file: string, laboratory: Laboratory) {
  const start = Date.now();
  const child = spawn(process.execPath, [path.join(root, `lib/local/${name}.mjs`), file], {
    stdio: ['ignore', 'ignore', 'pipe'],
    env: {
      ...process.env,
      DATABASE_URL: laboratory.databaseUrl,
      RAREBOUND_DATA_DIR: laboratory.folder,
    },
  });
  let said = '';
  child.stderr.on('data', (part) => {
    said += part;
  });
  return new Promise<number>((resolve, reject) => {
    child.once('exit', (code) => {
      if (code === 0) resolve((Date.now() - start) / 1000);
      else reject(new Error(`${name} ended with ${code}: ${said}`));
    });
  });
}

const megabytes = (bytes: number) => Math.round(bytes / 2 ** 20);

async function measure({ laboratory: open, folder, root, say }: Bench): Promise<Measured> {
  const laboratory = await open({ workers: 0, web: false });
  const start = Date.now();
  const wanted = await fill(laboratory);
  say(`${wanted} maps invented in ${Math.round((Date.now() - start) / 1000)} s`);
  const look = async () => (await query<Fingerprint>(laboratory.databaseUrl, FINGERPRINT))[0];
  const before = await look();
  const file = path.join(folder, 'large.dump');
  const backupS = await command(root, 'backup', file, laboratory);
  const fileMb = megabytes(statSync(file).size);
  say(`backup in ${backupS.toFixed(0)} s, ${fileMb} MiB`);
  await query(laboratory.databaseUrl, 'delete from completeness_map');
  const restoreS = await command(root, 'restore', file, laboratory);
  const after = await look();
  const isSame = after.digest === before.digest && after.maps === wanted;
  const total = backupS + restoreS;
  return {
    isMet: isSame && Number(before.bytes) >= bytesWanted() && total < MOST_SECONDS,
    figure:
      `${before.maps} maps, ${megabytes(Number(before.bytes))} MiB of numbers, ` +
      `${megabytes(Number(before.stored))} MiB on the disk: backup ${backupS.toFixed(0)} s ` +
      `(${fileMb} MiB), restore ${restoreS.toFixed(0)} s, digests ${isSame ? 'equal' : 'differ'}`,
    details: { ...before, fileMb, backupS, restoreS, isSame },
  };
}

export const row: Row = {
  name: 'keep-large',
  what: 'K2: backup and restore of 1 GiB of maps',
  goal: `equal digests, both within ${MOST_SECONDS} s`,
  measure,
};
