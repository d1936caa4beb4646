import { createElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import type { DataColumn, Facet, TableView } from '@/components/ui/data-table/column';
import { DataTable } from '@/components/ui/data-table/data-table';
import { rowsCsv } from '@/components/ui/data-table/rows-csv';
import {
  arrangeRows,
  compareCells,
  keepsRow,
  nextSelection,
  nextSort,
} from '@/components/ui/data-table/use-data-rows';
import { readView, writeView } from '@/components/ui/data-table/use-table-view';

interface Planet {
  id: string;
  name: string;
  massMjup: number | null;
}

const columns: DataColumn<Planet>[] = [
  { id: 'name', head: 'name', name: 'name', isRowHead: true, value: ({ name }) => name },
  {
    id: 'mass',
    head: 'mass',
    name: 'mass, Jupiter masses',
    isNumeric: true,
    value: ({ massMjup }) => massMjup,
    total: 'two',
  },
  {
    id: 'curve',
    head: 'curve',
    name: 'curve',
    isUnsorted: true,
    isUnwritten: true,
    value: () => null,
  },
];

const planets = (count: number): Planet[] =>
  Array.from({ length: count }, (_, i) => ({ id: `p${i}`, name: `RB ${i}`, massMjup: i }));

const draw = (rows: Planet[], extra = {}) =>
  renderToStaticMarkup(
    createElement(DataTable<Planet>, {
      caption: 'Planets',
      rows,
      columns,
      rowId: ({ id }) => id,
      noun: { one: 'planet', many: 'planets' },
      searchLabel: 'Name',
      isInAddress: false,
      ...extra,
    }),
  );

const heavy: Facet<Planet> = {
  id: 'mass',
  label: 'Mass',
  any: 'any mass',
  options: [{ value: 'heavy', label: 'heavy' }],
  keeps: ({ massMjup }) => (massMjup ?? 0) > 5,
};
const view = (part: Partial<TableView>): TableView => ({
  words: '',
  sort: null,
  facets: {},
  ...part,
});

describe('the order of cells', () => {
  it('is that of numbers, and of numbers inside words', () => {
    expect([10, 9, 2.5].sort(compareCells)).toEqual([2.5, 9, 10]);
    expect(['RB 10', 'rb 9', 'RB 100'].sort(compareCells)).toEqual(['rb 9', 'RB 10', 'RB 100']);
  });
});

describe('what is kept', () => {
  const planet = { id: 'a', name: 'RB 0012', massMjup: 3 };
  const kept = (part: Partial<TableView>) =>
    keepsRow(planet, view(part), [heavy], ({ name }) => name);

  it('fits words whatever their spaces and case, and every facet', () => {
    expect(kept({ words: ' rb00 ' })).toBe(true);
    expect(kept({ words: 'rb 13' })).toBe(false);
    expect(kept({ words: 'rb', facets: { mass: 'heavy' } })).toBe(false);
    expect(kept({ words: 'rb', facets: { mass: '' } })).toBe(true);
  });
});

describe('the order of rows', () => {
  const mixed = [...planets(12), { id: 'u', name: 'RB u', massMjup: null }];
  const ids = (part: Partial<TableView>) =>
    arrangeRows(mixed, columns, view(part), []).map(({ id }) => id);

  it('goes both ways with what is unknown last, and otherwise is as the rows came', () => {
    expect(ids({ sort: { id: 'mass', isDescending: true } }).slice(0, 2)).toEqual(['p11', 'p10']);
    expect(ids({ sort: { id: 'mass', isDescending: true } }).at(-1)).toBe('u');
    expect(ids({ sort: { id: 'mass', isDescending: false } }).at(-1)).toBe('u');
    expect(ids({})).toEqual(mixed.map(({ id }) => id));
    expect(ids({ sort: { id: 'curve', isDescending: true } })).toEqual(ids({}));
  });

  it('turns at each press of a head, numbers from the largest', () => {
    const [name, mass] = columns;
    const presses = (column: typeof name) => {
      const first = nextSort(column, null);
      const second = nextSort(column, first);
      return [first?.isDescending, second?.isDescending, nextSort(column, second)];
    };
    expect(presses(mass)).toEqual([true, false, null]);
    expect(presses(name)).toEqual([false, true, null]);
    expect(nextSort(name, nextSort(mass, null))?.id).toBe('name');
  });
});

describe('the pressed boxes', () => {
  const shown = ['a', 'b', 'c', 'd'];
  it('are one, or all from the last one with Shift, in either direction', () => {
    expect([...nextSelection(new Set(['x']), shown, 'b', null)]).toEqual(['x', 'b']);
    expect([...nextSelection(new Set(['d']), shown, 'b', 'd')].sort()).toEqual(['b', 'c', 'd']);
    expect([...nextSelection(new Set(shown), shown, 'c', 'a')]).toEqual(['d']);
    expect([...nextSelection(new Set(), shown, 'c', 'gone')]).toEqual(['c']);
  });
});

describe('the address of a view', () => {
  it('reads back what it says, beside what else stands there', () => {
    const there = view({
      words: 'beta pic',
      sort: { id: 'mass', isDescending: true },
      facets: { mass: 'heavy' },
    });
    const search = writeView(new URLSearchParams('target=7'), there, ['mass']);
    expect(search.get('target')).toBe('7');
    expect(search.get('sort')).toBe('-mass');
    expect(readView(search, ['mass'])).toEqual(there);
    expect(writeView(search, view({}), ['mass']).toString()).toBe('target=7');
  });
});

describe('the file of a table', () => {
  it('quotes, guards what a spreadsheet would run, and leaves unknown cells empty', () => {
    const rows = [
      { id: 'a', name: '=1+1', massMjup: null },
      { id: 'b', name: 'one, "two"', massMjup: -0.5 },
    ];
    expect(rowsCsv(rows, columns)).toBe(
      'name,"mass, Jupiter masses"\n\'=1+1,\n"one, ""two""",-0.5\n',
    );
    expect(() =>
      rowsCsv([{ id: 'c', name: 'c', massMjup: Number.POSITIVE_INFINITY }], columns),
    ).toThrow(/finite/);
  });
});

describe('DataTable', () => {
  it('says how many rows there are, and orders by button', () => {
    const markup = draw(planets(3), { hasTotal: true });
    expect(markup).toContain('3 planets');
    expect(markup.match(/aria-sort="none"/g)).toHaveLength(2);
    expect(markup).toMatch(/<tr[^>]*border-rule2[^>]*>.*two/);
    expect(markup).not.toContain('aria-rowcount');
  });

  it('counts what is selected, and names each box', () => {
    const markup = draw(planets(3), {
      selection: {
        ids: new Set(['p1']),
        onChange: () => {},
        label: ({ name }: Planet) => `Compare ${name}`,
      },
    });
    expect(markup).toContain('3 planets, 1 selected');
    expect(markup).toContain('Compare RB 1');
    expect(markup.match(/checked=""/g)).toHaveLength(1);
  });

  it('draws only what is in sight of thousands, and says how many there are', () => {
    const markup = draw(planets(5000));
    expect(markup).toContain('aria-rowcount="5001"');
    const drawn = markup.match(/data-index=/g) ?? [];
    expect(drawn.length).toBeGreaterThan(15);
    expect(drawn.length).toBeLessThan(60);
  });

  it('offers the way back where nothing fits', () => {
    const markup = draw([]);
    expect(markup).toContain('No planet fits');
  });
});
