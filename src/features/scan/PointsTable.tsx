import { useId, useState } from 'react';
import { DataCell, DataRow, DataTable, HeadCell, RowHead, TableHead } from '../../components/DataTable';
import { TextButton } from '../../components/TextLink';
import { useCommands } from '../../lib/commands';
import { formatAngle, withTrueMinus } from '../../lib/format';
import { type FittedScan, plottedPoints } from './scan-points';
import { valueWords } from './scan-words';

/** More rows than this make no one wiser, and the file has them all. */
const MOST_ROWS = 500;

/** The numbers of the plot, one key (`v`) or one press away. */
export function PointsTable({ scan }: { readonly scan: FittedScan }) {
  const [isOpen, setIsOpen] = useState(false);
  const id = useId();
  useCommands([
    { id: 'scan-table', label: 'Show the scan as a table', keys: ['v'], run: () => setIsOpen(!isOpen) },
  ]);
  return (
    <div className="mt-2">
      <TextButton aria-expanded={isOpen} aria-controls={id} onClick={() => setIsOpen(!isOpen)}>
        {isOpen ? 'Hide the points’ table' : 'The points as a table'}
      </TextButton>
      <div id={id}>{isOpen && <Rows scan={scan} />}</div>
    </div>
  );
}

function Rows({ scan }: { readonly scan: FittedScan }) {
  const points = plottedPoints(scan);
  const shown = points.slice(0, MOST_ROWS);
  const digits = scan.found.kind === 'linear' && scan.found.fit.ports === 'both' ? 4 : 5;
  return (
    <div className="mt-2 max-h-96 overflow-y-auto" tabIndex={0} role="region" aria-label="Points of the scan">
      <DataTable caption={`Points of the scan: ${valueWords(scan)}`}>
        <TableHead>
          <tr>
            <HeadCell>line</HeadCell>
            <HeadCell numeric>dial, °</HeadCell>
            <HeadCell numeric>measured</HeadCell>
            <HeadCell numeric>fitted</HeadCell>
            <HeadCell numeric>residual, σ</HeadCell>
            <HeadCell>
              <span className="sr-only">state</span>
            </HeadCell>
          </tr>
        </TableHead>
        <tbody>
          {shown.map(({ line, dialDeg, value, fitted, residualSigmas, isUsed, isSuspected }) => (
            <DataRow key={line}>
              <RowHead>{line}</RowHead>
              <DataCell numeric>{formatAngle(dialDeg, 2).replace('°', '')}</DataCell>
              <DataCell numeric>{withTrueMinus(value.toPrecision(digits))}</DataCell>
              <DataCell numeric>{withTrueMinus(fitted.toPrecision(digits))}</DataCell>
              <DataCell numeric>{withTrueMinus(residualSigmas.toFixed(1))}</DataCell>
              <DataCell>{isUsed ? (isSuspected ? 'looks wrong' : '') : 'left out'}</DataCell>
            </DataRow>
          ))}
        </tbody>
      </DataTable>
      {points.length > shown.length && (
        <p className="text-s text-ink-2 py-2">{points.length - shown.length} more rows are in the file.</p>
      )}
    </div>
  );
}
