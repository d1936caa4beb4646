import { CompletenessMapChart } from '@/components/charts/completeness-map-chart';
import { ContrastChart } from '@/components/charts/contrast-chart';
import { RampKey } from '@/components/charts/ramp-key';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import type { UploadPreview } from '@/lib/schemas/uploads';

const shownDigits = 8;
const say = (cell: string | number | null) =>
  cell === null
    ? '–'
    : typeof cell === 'number'
      ? String(Number(cell.toPrecision(shownDigits)))
      : cell;

function FirstRows({ table, rows }: { table: NonNullable<UploadPreview['table']>; rows: number }) {
  const isNumeric = (column: number) =>
    table.rows.some((cells) => typeof cells[column] === 'number');
  return (
    <Table
      isCaptionShown
      caption={
        rows > table.rows.length
          ? `The first ${table.rows.length} of ${rows} rows, in our columns and units`
          : 'The rows, in our columns and units'
      }
    >
      <TableHead>
        <Row>
          {table.columns.map(({ name, unit }, index) => (
            <HeadCell key={name} isNumeric={isNumeric(index)}>
              {name}
              {unit ? `, ${unit}` : ''}
            </HeadCell>
          ))}
        </Row>
      </TableHead>
      <TableBody>
        {table.rows.map((cells, row) => (
          // biome-ignore lint/suspicious/noArrayIndexKey: rows of a file have their position as name
          <Row key={row}>
            {cells.map((cell, index) => (
              <Cell
                key={table.columns[index].name}
                isNumeric={isNumeric(index)}
                className="max-w-[28ch] truncate"
              >
                {say(cell)}
              </Cell>
            ))}
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}

/** Curves of one star at several epochs are told apart by what the file says of them. */
function curveNames(curves: UploadPreview['curves']): string[] {
  const names = curves.map(({ target, band, epoch }) =>
    [target, band, epoch].filter(Boolean).join(', '),
  );
  return names.map((name, index) =>
    names.indexOf(name) < index ? `${name} (${index + 1})` : name,
  );
}

/** The beginning of a file as it was read, before anything is stored. */
export function FilePreview({ preview, rows }: { preview: UploadPreview; rows: number }) {
  const { table, curves, maps } = preview;
  const names = curveNames(curves);
  const sigmas = new Set(curves.map(({ nSigma }) => nSigma));
  return (
    <div className="mb-5 flex flex-col gap-5">
      {table && table.rows.length > 0 && <FirstRows table={table} rows={rows} />}
      {curves.length > 0 && (
        <div className="max-w-[560px]">
          <p className="mb-1 text-ink3 text-note">
            {curves.length === 1 ? 'The first curve' : `The first ${curves.length} curves`}:{' '}
            {names.join('; ')}
          </p>
          <ContrastChart
            height={230}
            nSigma={sigmas.size === 1 ? curves[0].nSigma : undefined}
            curves={curves.map((curve, index) => ({
              name: names[index],
              separationArcsec: Float64Array.from(curve.separationArcsec),
              contrastMag: Float64Array.from(curve.contrastMag),
            }))}
          />
        </div>
      )}
      {maps.length > 0 && (
        <div>
          <div className="grid gap-6 md:grid-cols-2 xl:grid-cols-3">
            {maps.map((map) => (
              <div key={map.target} className="min-w-0">
                <p className="mb-1 text-ink3 text-note">{map.target}, thinned for this drawing</p>
                <CompletenessMapChart
                  height={230}
                  subject={`detection probability of ${map.target}`}
                  map={{
                    massMjup: Float64Array.from(map.massMjup),
                    semiMajorAxisAu: Float64Array.from(map.semiMajorAxisAu),
                    completeness: Float64Array.from(map.completeness),
                  }}
                />
              </div>
            ))}
          </div>
          <RampKey label="detection probability" />
        </div>
      )}
    </div>
  );
}
