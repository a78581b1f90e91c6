import { inOrder } from './document-order';
import { type CabinetDocument, type DocumentPlate, type DocumentRef, refKey } from './document';
import type { ImportChange, ImportPlan, ImportRefusal } from './import-plan';
import { planCalibrations } from './plan-calibrations';
import { fieldChanges, headOf, type Match, matchParts, refOf, seatMarks } from './plan-parts';
import { planSeats, type PlannedPlate, refuseTakenMounts } from './plan-seats';

/**
 * What it takes to bring a lab's cabinet to what a file says, as far as that only adds: mounts, plates and their facts, later
 * seats, calibrations. Nothing is removed and nothing that was measured is changed; what would need that is refused with a
 * reason. Both are whole documents as `readCabinet` gives them.
 */
export function planImport(present: CabinetDocument, wanted: CabinetDocument): ImportPlan {
  const file = inOrder(wanted);
  const [here, there] = [seatMarks(present), seatMarks(file)];
  const none: ReadonlySet<string> = new Set();
  const mounts = matchParts(present.mounts, file.mounts, (mount, side) => {
    return (side === 'present' ? here : there).ofMount.get(refKey(mount)) ?? none;
  });
  const plates = matchParts(present.plates, file.plates, (plate, side) => {
    return (side === 'present' ? here : there).ofPlate.get(refKey(plate)) ?? none;
  });

  const changes: ImportChange[] = [];
  const refused: ImportRefusal[] = [];
  const unchanged = { mounts: 0, plates: 0, seats: 0, calibrations: 0 };
  const mountHere = new Map<string, DocumentRef>();
  for (const [mount, match] of mounts) {
    mountHere.set(refKey(mount), refOf(match.kind === 'new' ? mount : match.present));
    if (match.kind === 'new') changes.push({ kind: 'mount-added', mount });
    else if (match.kind === 'refused')
      refused.push({ what: 'mount', name: mount.name, reason: match.reason });
    else {
      const fields = fieldChanges(match.present, mount);
      if (fields.length === 0) unchanged.mounts += 1;
      else changes.push({ kind: 'mount-changed', mount: refOf(match.present), to: mount, fields });
    }
  }

  const planned = [...plates].flatMap(([plate, match]) => plannedPlate(plate, match, mountHere, refused));
  refuseTakenMounts(present, planned);
  for (const plate of planned) {
    const { known, wanted: file } = plate;
    const fields = known === null ? [] : fieldChanges(headOf(known), headOf(file));
    if (known === null) changes.push({ kind: 'plate-added', plate: headOf(file) });
    else if (fields.length === 0) unchanged.plates += 1;
    else changes.push({ kind: 'plate-changed', plate: refOf(known), to: headOf(file), fields });
    for (const seat of plate.seats) {
      if (seat.end !== null) {
        changes.push({ kind: 'seat-ended', plate: plate.ref, seat: seat.ref, ...seat.end });
      } else if (seat.state === 'added') {
        const { seatedAt, leftAt, leftWhy } = seat.wanted;
        changes.push({
          kind: 'seat-added',
          plate: plate.ref,
          seat: { mount: seat.ref.mount, seatedAt, leftAt, leftWhy },
        });
      } else if (seat.state === 'known' && seat.reason === null) unchanged.seats += 1;
      if (seat.reason !== null) refused.push({ what: 'seat', name: file.name, reason: seat.reason });
    }
    const measured = planCalibrations(plate);
    changes.push(...measured.changes);
    refused.push(...measured.refused);
    unchanged.calibrations += measured.unchanged;
  }
  return { changes, refused, unchanged };
}

function plannedPlate(
  plate: DocumentPlate,
  match: Match<DocumentPlate>,
  mountHere: ReadonlyMap<string, DocumentRef>,
  refused: ImportRefusal[],
): readonly PlannedPlate[] {
  if (match.kind === 'refused') {
    refused.push({ what: 'plate', name: plate.name, reason: match.reason });
    return [];
  }
  const known = match.kind === 'known' ? match.present : null;
  return [{ ref: refOf(known ?? plate), wanted: plate, known, seats: planSeats(known, plate, mountHere) }];
}
