import { magnitudeFamily } from './bands';
import type { KindColumns } from './columns';
import { companionColumns, readCompanions } from './companions';
import { coolingColumns, coolingFamily, readCoolingTable } from './cooling-tables';
import { curveColumns, readCurves } from './curves';
import type { ReadContext, RecordsOfKind, SampleRecord, UploadKind } from './kinds';
import { uploadLimits } from './limits';
import { longMapColumns, readLongMaps } from './maps-long';
import type { TableReading } from './reading';
import { readSampleRows, sampleColumns } from './samples';
import { readSystems, systemsColumns } from './systems';
import { targetColumns } from './target-columns';
import { readTargets } from './targets';

/** How a plain table becomes the records of one kind. */
export interface KindReader<R> {
  columns(context: ReadContext): KindColumns;
  read(reading: TableReading, context: ReadContext): R[];
  maxRows: number;
  /** A table without rows is an answer and not an oversight. */
  mayBeEmpty?: boolean;
  what: string;
}

export const kindReaders: { [K in UploadKind]: KindReader<RecordsOfKind[K][number]> } = {
  targets: {
    columns: ({ bands }) => ({ specs: targetColumns, family: magnitudeFamily(bands) }),
    read: readTargets,
    maxRows: uploadLimits.tableRows,
    what: 'target',
  },
  'contrast-curves': {
    columns: () => ({ specs: curveColumns }),
    read: readCurves,
    maxRows: uploadLimits.tableRows,
    what: 'separation',
  },
  'completeness-maps': {
    columns: () => ({ specs: longMapColumns }),
    read: readLongMaps,
    maxRows: uploadLimits.longMapRows,
    what: 'grid point',
  },
  companions: {
    columns: () => ({ specs: companionColumns }),
    read: readCompanions,
    maxRows: uploadLimits.tableRows,
    mayBeEmpty: true,
    what: 'companion',
  },
  'cooling-tables': {
    columns: () => ({ specs: coolingColumns, family: coolingFamily }),
    read: readCoolingTable,
    maxRows: uploadLimits.tableRows,
    what: 'age and mass',
  },
  systems: {
    columns: () => ({ specs: systemsColumns }),
    read: readSystems,
    maxRows: uploadLimits.systemRows,
    what: 'system',
  },
};

export const sampleReader: KindReader<SampleRecord> = {
  columns: () => ({ specs: sampleColumns }),
  read: readSampleRows,
  maxRows: uploadLimits.longMapRows,
  what: 'draw',
};
