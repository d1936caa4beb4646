import { mkdirSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { drawPosterior } from '@/app/api/v1/collaborations/[collaboration]/runs/[run]/exports/[file]/posterior-drawing';
import { collectBytes, type WrittenMaps, type WrittenTarget } from '@/lib/formats';
import { mapsBytes } from '@/lib/services/exports/array-formats';
import { runProvenance } from '@/lib/services/exports/provenance';
import { defaultOptions, runExports } from '@/lib/services/exports/registry';
import { mapsOfRun } from '@/lib/services/exports/run-arrays';
import { tableBytes, tableEndings } from '@/lib/services/exports/table-formats';
import { companionsTable, targetsTable } from '@/lib/services/exports/written-rows';
import { figureAsPdf } from '@/lib/services/figures';
import { AWKWARD_NAMES, buildExportRun, mapOfStar } from '../support/export-run';
import { ABSENT_TARGET } from '../support/written-target';

const run = buildExportRun();

function targetOf(name: string, i: number): WrittenTarget {
  return {
    ...ABSENT_TARGET,
    name,
    otherNames: i === 1 ? ['HIP 1', 'GJ 2'] : [],
    gaiaDr3Id: i === 2 ? null : `615171271776315541${i}`,
    raDeg: 10.1 + i,
    decDeg: -1 / (i + 3),
    refEpoch: 2016,
    distancePc: i === 3 ? null : 10 / 3 + i,
    distanceErrorPc: i === 3 ? null : 0.01,
    parallaxMas: i === 3 ? 1e-5 : null,
    ageMyr: 24 + i,
    ageLowerMyr: 21,
    ageUpperMyr: 40,
    hostMassMsun: i === 0 ? null : 1.1,
    magnitudes: i === 4 ? {} : { K: { valueMag: 4.537, errorMag: 0.024 } },
    debrisDisk: i === 1 ? null : i % 2 === 0,
    notes: i === 1 ? 'seen twice, "b" and #2' : null,
  };
}

const uses = AWKWARD_NAMES.map((_, i) => ({
  survey: 'plover',
  used: i !== 0,
  reason: i === 0 ? 'outside the sample' : null,
}));

/** Tables that a run reads from the database, made from rows instead. */
const storedTables = {
  targets: targetsTable(
    { name: 'targets', title: 'Targets of A-3, run 18', provenance: runProvenance(run) },
    AWKWARD_NAMES.map(targetOf),
    uses,
  ),
  companions: companionsTable(
    { name: 'companions', title: 'Companions of A-3, run 18', provenance: runProvenance(run) },
    AWKWARD_NAMES.map((target, i) => ({
      target,
      companion: 'b',
      status: 'confirmed',
      massMjup: 8 / (i + 3),
      massErrorLowerMjup: i === 2 ? null : 1,
      massErrorUpperMjup: i === 2 ? null : 1 + i,
      semiMajorAxisAu: 40,
      semiMajorAxisErrorLowerAu: null,
      semiMajorAxisErrorUpperAu: null,
      projectedSeparationAu: null,
      separationArcsec: 0.1,
      separationErrorArcsec: null,
      positionAngleDeg: null,
      positionAngleErrorDeg: null,
      contrastMag: null,
      contrastErrorMag: null,
      band: 'K',
      epoch: i === 0 ? null : '2014-05-01',
      eccentricity: null,
      commonProperMotion: 'yes',
      probability: 1,
      reference: null,
    })),
    uses,
  ),
};

const maps = (): WrittenMaps => ({
  ...mapsOfRun(run, 'float32'),
  async *maps() {
    for (let star = 0; star < AWKWARD_NAMES.length; star += 1) yield mapOfStar(star);
  },
});

/** Writes every kind of file that a run offers, and says which there are. */
export async function writeExports(folder: string): Promise<string[]> {
  mkdirSync(folder, { recursive: true });
  const names: string[] = [];
  const save = (name: string, content: string | Uint8Array) => {
    writeFileSync(path.join(folder, name), content);
    names.push(name);
  };
  for (const { name, make } of runExports) {
    const [stem, ending] = name.split('.');
    if (stem in storedTables) {
      const table = storedTables[stem as keyof typeof storedTables];
      const latex = { columns: table.columns.slice(0, 6).map((column) => column.name) };
      const format = tableEndings.find((one) => one === ending);
      if (!format) throw new Error(`${name} is no table`);
      save(name, tableBytes(table, format, { latex, label: 'tab:x', style: 'deluxetable' }));
    } else if (stem === 'maps') {
      save(name, await collectBytes(await mapsBytes(maps(), ending as 'npz')));
    } else save(name, await collectBytes(await make(run, defaultOptions)));
  }
  const svg = drawPosterior(run, 88);
  save('posterior.svg', svg);
  save('posterior.pdf', await figureAsPdf(svg));
  return names;
}
