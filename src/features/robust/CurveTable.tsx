import { DataCell, DataRow, DataTable, HeadCell, RowHead, TableHead } from '../../components/DataTable';
import { Scientific } from '../../components/Scientific';
import { GapText } from '../../lib/GapText';
import type { Design } from './design';
import { listedCurves } from './design-curves';
import { errorName, errorWords } from './design-words';

/** The plot as rows. */
export function CurveTable({ design, tolerance }: { readonly design: Design; readonly tolerance: number }) {
  const { errors, composite, plain } = listedCurves(design);
  const cell = (infidelity: number) => (
    <>
      <Scientific value={infidelity} decimals={2} />
      {infidelity > tolerance && (
        <span className="block font-sans text-s font-strong text-fault">not within</span>
      )}
    </>
  );
  return (
    <DataTable caption={`1 − F by the ${errorName(design.error)}`} className="mt-2 max-w-150">
      <TableHead>
        <tr>
          <HeadCell>error</HeadCell>
          <HeadCell numeric>1 − F, composite</HeadCell>
          <HeadCell numeric>1 − F, plain</HeadCell>
        </tr>
      </TableHead>
      <tbody>
        {errors.map((error, k) => (
          <DataRow key={error}>
            <RowHead className="font-mono">
              <GapText text={errorWords(error, design.error)} />
            </RowHead>
            <DataCell numeric>{cell(composite[k] ?? 1)}</DataCell>
            <DataCell numeric>{cell(plain[k] ?? 1)}</DataCell>
          </DataRow>
        ))}
      </tbody>
    </DataTable>
  );
}
