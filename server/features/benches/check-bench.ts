import type { Convention } from '../../../shared/optics/convention';
import { parseState } from '../../../shared/optics/expression';
import type { CreateBench } from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { refused, type FieldFault } from '../../errors';
import { findPlates } from '../cabinet';
import { findHolders } from './bench-store';

/**
 * What no schema can see of a bench: that its input can be read, and that its plates are there, in use, and nowhere else.
 * @throws ProblemError 422 naming each field at fault.
 */
export async function checkBench(
  transaction: Transaction,
  place: { readonly labId: string; readonly benchId: string; readonly convention: Convention },
  bench: CreateBench,
): Promise<void> {
  const faults: FieldFault[] = [];
  const input = parseState(bench.inputExpression, place.convention);
  if (!input.ok) {
    faults.push({ path: 'inputExpression', message: `Column ${input.error.column}: ${input.error.message}` });
  }
  const places = [
    ...bench.plateIds.map((plateId, index) => ({ plateId, path: `plateIds.${index}` })),
    ...bench.analysisPlateIds.map((plateId, index) => ({ plateId, path: `analysisPlateIds.${index}` })),
  ];
  const plateIds = places.map(({ plateId }) => plateId);
  // Held, so that none is retired between this look and the bench's own row.
  await transaction('plates')
    .where({ lab_id: place.labId })
    .whereIn('id', plateIds)
    .orderBy('id')
    .forShare()
    .select('id');
  const found = await findPlates(transaction, place.labId, plateIds);
  const plates = new Map(found.map((plate) => [plate.id, plate]));
  const holders = await findHolders(transaction, place.labId, plateIds, place.benchId);
  for (const { plateId, path } of places) {
    const plate = plates.get(plateId);
    const holder = holders.find(({ plate_id }) => plate_id === plateId);
    if (plate === undefined)
      faults.push({ path, message: 'There is no such plate in the cabinet. Choose another.' });
    else if (plate.retiredAt !== null) {
      faults.push({
        path,
        message: `${plate.name} is retired. Return it to the cabinet, or choose another.`,
      });
    } else if (holder !== undefined) {
      faults.push({
        path,
        message: `${plate.name} stands in the beam of ${holder.bench_name}. Choose another, or take it out there first.`,
      });
    }
  }
  if (faults.length > 0) throw refused(faults);
}
