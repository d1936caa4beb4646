import type { ColumnSpec } from './columns';
import type { SystemsRecord } from './kinds';
import { notNegative, positive, type TableReading } from './reading';
import { quoteFound } from './reports';

export const systemsColumns: readonly ColumnSpec[] = [
  { name: 'system', required: true },
  { name: 'weight', unit: 'plain number' },
  { name: 'mass', required: true, unit: 'companion mass' },
  { name: 'semi_major_axis', required: true, unit: 'semi-major axis' },
];

interface System {
  index: number;
  weight: number;
  companions: number;
  /** Whether a row says that the system has no companion. */
  isEmpty: boolean;
}

/**
 * Reads planetary systems: one row per companion; a row without mass and semi-major axis stands for
 * a system that has none.
 */
export function readSystems(reading: TableReading): SystemsRecord[] {
  const systems = new Map<string, System>();
  const record: SystemsRecord = {
    weight: [],
    companionSystem: [],
    massMjup: [],
    semiMajorAxisAu: [],
  };
  for (let row = 0; row < reading.table.rowCount; row += 1) {
    const name = reading.text('system', row);
    const weight = reading.number('weight', row, notNegative);
    const mass = reading.number('mass', row, positive);
    const axis = reading.number('semi_major_axis', row, positive);
    if (name === null) reading.missing('system', row, 'a name or number of the system');
    if (weight === null && reading.has('weight')) {
      reading.missing('weight', row, "the system's weight in each of its rows");
    }
    if (typeof name !== 'string') continue;
    const system = systemOf(systems, record, name, weight ?? 1);
    if (typeof weight === 'number' && weight !== system.weight) {
      tellOtherWeight(reading, row, name, system.weight);
    }
    if (mass === null && axis === null) {
      checkEmpty(reading, row, name, system);
      system.isEmpty = true;
      continue;
    }
    if (mass === null) reading.missing('mass', row, 'a mass, as a semi-major axis is given');
    if (axis === null) reading.missing('semi_major_axis', row, 'a value, as a mass is given');
    if (system.isEmpty) checkEmpty(reading, row, name, { ...system, companions: 1 });
    system.companions += 1;
    if (typeof mass !== 'number' || typeof axis !== 'number') continue;
    record.companionSystem.push(system.index);
    record.massMjup.push(mass);
    record.semiMajorAxisAu.push(axis);
  }
  if (reading.faults.count > 0) return [];
  checkWhole(reading, record);
  if (reading.faults.count > 0) return [];
  tellWeights(reading, systems);
  return [record];
}

function systemOf(
  systems: Map<string, System>,
  record: SystemsRecord,
  name: string,
  weight: number,
): System {
  const known = systems.get(name);
  if (known !== undefined) return known;
  const system = { index: systems.size, weight, companions: 0, isEmpty: false };
  systems.set(name, system);
  record.weight.push(weight);
  return system;
}

function tellOtherWeight(reading: TableReading, row: number, name: string, first: number): void {
  reading.fault(reading.place(row, 'weight'), {
    code: 'value-conflict',
    item: `system ${quoteFound(name)}`,
    found: `${reading.raw('weight', row)}, where its first row has ${first}`,
    expected: 'one weight for a system',
  });
}

/** A row without companion belongs to a system that has none, and stands there once. */
function checkEmpty(reading: TableReading, row: number, name: string, system: System): void {
  if (system.companions === 0 && !system.isEmpty) return;
  reading.fault(reading.place(row), {
    code: 'value-conflict',
    item: `system ${quoteFound(name)}`,
    found:
      system.companions > 0 ? 'companions and a row without one' : 'two rows without a companion',
    expected: 'its companions, or one row that leaves mass and semi_major_axis empty',
  });
}

function checkWhole(reading: TableReading, { weight, companionSystem }: SystemsRecord): void {
  if (!Number.isFinite(weight.reduce((sum, value) => sum + value, 0))) {
    reading.fault(reading.table.headingPlace, {
      code: 'out-of-range',
      found: 'weights whose sum is too large to be stored',
      expected: 'smaller weights; only their ratios matter',
    });
  }
  if (!companionSystem.some((system) => weight[system] > 0)) {
    reading.fault(reading.table.headingPlace, {
      code: 'too-few',
      found: 'no companion in a system of weight above 0',
      expected: 'at least one',
    });
  }
}

function tellWeights(reading: TableReading, systems: Map<string, System>): void {
  const empty = [...systems.values()].filter(({ companions }) => companions === 0).length;
  if (!reading.has('weight')) {
    reading.notes.inform('default-used', 'No weights are given: every system counts the same');
  }
  if (empty > 0) {
    const count = empty === 1 ? '1 system has' : `${empty} systems have`;
    reading.notes.inform('systems-empty', `${count} no companion and count as such`);
  }
}
