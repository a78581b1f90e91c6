import { DataCell, DataRow, DataTable, HeadCell, TableHead } from '../../components/DataTable';
import { missingSign } from '../../lib/format';
import { faultPlace } from './plan-words';

/** Every fault of a file by row and column, as a spreadsheet counts them. */
export function FaultTable({
  faults,
}: {
  readonly faults: readonly { readonly path: string; readonly message: string }[];
}) {
  const places = faults.map((fault) => ({ ...fault, ...faultPlace(fault.path) }));
  const inRows = places.some(({ row }) => row !== '');
  return (
    <DataTable caption="The faults of the file" className="overflow-x-auto">
      <TableHead>
        <tr>
          {inRows && <HeadCell numeric>row</HeadCell>}
          <HeadCell>{inRows ? 'column' : 'where'}</HeadCell>
          <HeadCell>what is wrong</HeadCell>
        </tr>
      </TableHead>
      <tbody>
        {places.map(({ row, column, message }, index) => (
          <DataRow key={index}>
            {inRows && <DataCell numeric>{row === '' ? missingSign : row}</DataCell>}
            <DataCell className={column === '' ? undefined : 'min-w-38 font-mono break-all'}>
              {column === '' ? (row === '' ? 'the whole file' : 'the whole row') : column}
            </DataCell>
            <DataCell>{message}</DataCell>
          </DataRow>
        ))}
      </tbody>
    </DataTable>
  );
}
