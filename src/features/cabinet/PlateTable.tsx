import { useState } from 'react';
import type { Plate } from '../../../shared/schemas/cabinet';
import { DataCell, DataRow, DataTable, HeadCell, RowHead, TableHead } from '../../components/DataTable';
import { TextField } from '../../components/TextField';
import { TextLink } from '../../components/TextLink';
import { formatUncertain } from '../../lib/format';
import { OnPoint, widestFraction } from './OnPoint';
import { calibrationAge } from './calibration-age';
import { type PlateColumn, plateRows } from './plate-rows';
import { kindNames } from './plate-words';

const columns: readonly { readonly id: PlateColumn; readonly label: string; readonly right: boolean }[] = [
  { id: 'name', label: 'plate', right: false },
  { id: 'kind', label: 'kind', right: false },
  { id: 'mount', label: 'mount', right: false },
  { id: 'retardance', label: 'retardance(σ), degrees', right: true },
  { id: 'wavelength', label: 'at, nm', right: true },
  { id: 'zero', label: 'zero(σ), degrees', right: true },
  { id: 'due', label: 'calibration', right: false },
];

interface Sort {
  readonly column: PlateColumn;
  readonly descending: boolean;
}

/** A head that sorts by its column; pressed again, the other way round. */
function SortHead(props: {
  readonly column: (typeof columns)[number];
  readonly sort: Sort;
  readonly onSort: (sort: Sort) => void;
}) {
  const { column, sort, onSort } = props;
  const sorted = sort.column === column.id;
  return (
    <HeadCell
      numeric={column.right}
      aria-sort={sorted ? (sort.descending ? 'descending' : 'ascending') : undefined}
    >
      <button
        type="button"
        className={`hover:bg-wash min-h-6 ${sorted ? 'text-ink font-strong' : ''}`}
        onClick={() => onSort({ column: column.id, descending: sorted && !sort.descending })}
      >
        {column.label}
        <span aria-hidden="true">{sorted ? (sort.descending ? ' ↓' : ' ↑') : ''}</span>
      </button>
    </HeadCell>
  );
}

const retardance = ({ calibration }: Plate) =>
  formatUncertain(calibration.retardanceDeg, calibration.retardanceSigmaDeg);
const zero = ({ calibration }: Plate) => formatUncertain(calibration.offsetDeg, calibration.offsetSigmaDeg);

/** The cabinet as rows: the same plates, sorted and searched. */
export function PlateTable(props: {
  readonly plates: readonly Plate[];
  readonly base: string;
  readonly dueDays: number;
  readonly now: Date;
}) {
  const { plates, base, dueDays, now } = props;
  const [text, setText] = useState('');
  const [withRetired, setWithRetired] = useState(false);
  const [sort, setSort] = useState<Sort>({ column: 'name', descending: false });
  const rows = plateRows(plates, { text, withRetired }, sort, dueDays, now);
  const widestRetardance = widestFraction(rows.map(retardance));
  const widestZero = widestFraction(rows.map(zero));
  const retired = plates.filter(({ retiredAt }) => retiredAt !== null).length;
  return (
    <>
      <div className="mb-4 flex flex-wrap items-end gap-x-6 gap-y-3">
        <TextField
          label="find by name, mount, kind, note or bench"
          type="search"
          className="w-80 max-w-full"
          value={text}
          onChange={(event) => setText(event.target.value)}
        />
        {retired > 0 && (
          <label className="flex min-h-10 items-center gap-2">
            <input
              type="checkbox"
              className="accent-ink size-5"
              checked={withRetired}
              onChange={(event) => setWithRetired(event.target.checked)}
            />
            retired ones too ({retired})
          </label>
        )}
        <p role="status" className="text-ink-2 flex min-h-10 items-center">
          {rows.length === 1 ? '1 plate' : `${rows.length} plates`}
        </p>
      </div>
      <DataTable caption="Plates of the cabinet">
        <TableHead>
          <tr>
            {columns.map((column) => (
              <SortHead key={column.id} column={column} sort={sort} onSort={setSort} />
            ))}
            <HeadCell>stands at</HeadCell>
          </tr>
        </TableHead>
        <tbody>
          {rows.map((plate) => {
            const { calibration, benches } = plate;
            const age = calibrationAge(calibration.measuredAt, dueDays, now);
            return (
              <DataRow key={plate.id}>
                <RowHead>
                  <TextLink to={`${base}/${plate.id}`}>{plate.name}</TextLink>
                  {plate.retiredAt !== null && <span className="font-words"> retired</span>}
                </RowHead>
                <DataCell>{kindNames[plate.kind]}</DataCell>
                <DataCell>{plate.mount.name}</DataCell>
                <DataCell numeric>
                  <OnPoint text={retardance(plate)} widest={widestRetardance} />
                </DataCell>
                <DataCell numeric>{calibration.wavelengthNm}</DataCell>
                <DataCell numeric>
                  <OnPoint text={zero(plate)} widest={widestZero} />
                </DataCell>
                <DataCell className={age.overdue ? 'text-fault font-strong' : ''}>{age.words}</DataCell>
                <DataCell>{benches.length === 0 ? '—' : benches.map(({ name }) => name).join(', ')}</DataCell>
              </DataRow>
            );
          })}
        </tbody>
      </DataTable>
      {rows.length === 0 && (
        <p className="mt-3">
          No plate is found by that. Shorten what you wrote, or take the retired ones in.
        </p>
      )}
    </>
  );
}
