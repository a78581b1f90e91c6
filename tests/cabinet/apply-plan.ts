import {
  type CabinetDocument,
  calibrationsOf,
  type DocumentPlate,
  type DocumentRef,
  inOrder,
  type ImportPlan,
  refKey,
} from '../../shared/cabinet-document';

/** A cabinet after an import, worked out on documents alone: what the database must come to as well. */
export function applied(present: CabinetDocument, plan: ImportPlan): CabinetDocument {
  const mounts = new Map(present.mounts.map((mount) => [refKey(mount), mount]));
  const plates = new Map(present.plates.map((plate) => [refKey(plate), structuredClone(plate)]));
  const plateOf = (ref: DocumentRef): DocumentPlate => {
    const plate = plates.get(refKey(ref));
    if (plate === undefined) throw new Error(`a plan names ${ref.name}, which is not there`);
    return plate;
  };
  const seatOf = (plate: DocumentPlate, { mount, seatedAt }: { mount: DocumentRef; seatedAt: string }) => {
    const seat = plate.seats.find((one) => one.seatedAt === seatedAt && refKey(one.mount) === refKey(mount));
    if (seat === undefined) throw new Error(`a plan names a seat of ${plate.name} that is not there`);
    return seat;
  };
  // By plate: what each stored or added calibration is, so that places can be worked out at the end.
  const links: { readonly plate: DocumentPlate; readonly from: object; readonly to: object }[] = [];
  const stored = new Map([...plates.values()].map((plate) => [plate, [...calibrationsOf(plate)]]));
  for (const [plate, all] of stored) {
    for (const one of all) {
      const to = one.settles === null ? undefined : all[one.settles - 1];
      if (to !== undefined) links.push({ plate, from: one, to });
    }
  }
  const added = new Map<string, object>();
  for (const change of plan.changes) {
    if (change.kind === 'mount-added') mounts.set(refKey(change.mount), change.mount);
    else if (change.kind === 'mount-changed') mounts.set(refKey(change.mount), change.to);
    else if (change.kind === 'plate-added') plates.set(refKey(change.plate), { ...change.plate, seats: [] });
    else if (change.kind === 'plate-changed') Object.assign(plateOf(change.plate), change.to);
    else if (change.kind === 'seat-ended') {
      Object.assign(seatOf(plateOf(change.plate), change.seat), {
        leftAt: change.leftAt,
        leftWhy: change.leftWhy,
      });
    } else if (change.kind === 'seat-added')
      plateOf(change.plate).seats.push({ ...change.seat, calibrations: [] });
    else {
      const calibration = { ...change.calibration, settles: null };
      seatOf(plateOf(change.plate), change.seat).calibrations.push(calibration);
      added.set(`${refKey(change.plate)} ${change.position}`, calibration);
    }
  }
  for (const change of plan.changes) {
    if (change.kind !== 'calibration-added' || change.settles === null) continue;
    const plate = plateOf(change.plate);
    const from = added.get(`${refKey(change.plate)} ${change.position}`);
    const to = change.settles.isStored
      ? stored.get(plate)?.[change.settles.position - 1]
      : added.get(`${refKey(change.plate)} ${change.settles.position}`);
    if (from === undefined || to === undefined) throw new Error('a plan settles what is not there');
    links.push({ plate, from, to });
  }
  for (const { plate, from, to } of links) {
    const all: readonly object[] = calibrationsOf(plate);
    Object.assign(from, { settles: all.indexOf(to) + 1 });
  }
  const named = (ref: DocumentRef): DocumentRef => {
    const mount = mounts.get(refKey(ref));
    return mount === undefined ? ref : { name: mount.name, retiredAt: mount.retiredAt };
  };
  return inOrder({
    format: present.format,
    mounts: [...mounts.values()],
    plates: [...plates.values()].map((plate) => ({
      ...plate,
      seats: plate.seats.map((seat) => ({ ...seat, mount: named(seat.mount) })),
    })),
  });
}
