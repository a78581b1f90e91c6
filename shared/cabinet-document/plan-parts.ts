import {
  type CabinetDocument,
  type DocumentMount,
  type DocumentPlate,
  type DocumentPlateHead,
  type DocumentRef,
  refKey,
  sameName,
} from './document';
import type { FieldChange, FieldValue } from './import-plan';
import { isRecord } from './read-parts';

/** What a mount or a plate of a file is in the lab. */
export type Match<Part extends DocumentRef> =
  | { readonly kind: 'known'; readonly present: Part }
  | { readonly kind: 'new' }
  /** The same one, but retired on one side: only a person can say which is right. */
  | { readonly kind: 'refused'; readonly present: Part; readonly reason: string };

/**
 * Finds what each mount, or each plate, of a file is in the lab: of those in use the one of its name, of the retired ones that
 * of its name and moment. `marks` gives what only the same thing can share: when it was seated, with what.
 */
export function matchParts<Part extends DocumentRef>(
  present: readonly Part[],
  wanted: readonly Part[],
  marks: (part: Part, side: 'present' | 'wanted') => ReadonlySet<string>,
): ReadonlyMap<Part, Match<Part>> {
  const known = new Map(present.map((part) => [refKey(part), part]));
  const named = new Map<string, Part[]>();
  for (const part of present)
    named.set(sameName(part.name), [...(named.get(sameName(part.name)) ?? []), part]);
  const inUse = new Set(
    wanted.filter(({ retiredAt }) => retiredAt === null).map(({ name }) => sameName(name)),
  );
  const match = (part: Part): Match<Part> => {
    const same = known.get(refKey(part));
    if (same !== undefined) return { kind: 'known', present: same };
    const others = named.get(sameName(part.name)) ?? [];
    if (part.retiredAt === null) {
      const mine = marks(part, 'wanted');
      const retired = others.find((other) => [...marks(other, 'present')].some((mark) => mine.has(mark)));
      if (retired === undefined) return { kind: 'new' };
      const reason = `${part.name} is retired here, and in use in the file. Return it to the cabinet first.`;
      return { kind: 'refused', present: retired, reason };
    }
    const used = others.find(({ retiredAt }) => retiredAt === null);
    if (used === undefined || inUse.has(sameName(part.name))) return { kind: 'new' };
    const reason = `${part.name} is in use here, and retired in the file. Retire it here first.`;
    return { kind: 'refused', present: used, reason };
  };
  return new Map(wanted.map((part) => [part, match(part)]));
}

/** When which plate, or which mount, was seated with a thing: by its own key. */
export function seatMarks(document: CabinetDocument) {
  const ofMount = new Map<string, Set<string>>();
  const ofPlate = new Map<string, Set<string>>();
  const add = (into: Map<string, Set<string>>, key: string, mark: string): void => {
    const marks = into.get(key);
    if (marks === undefined) into.set(key, new Set([mark]));
    else marks.add(mark);
  };
  for (const plate of document.plates) {
    for (const { mount, seatedAt } of plate.seats) {
      add(ofMount, refKey(mount), `${seatedAt} ${sameName(plate.name)}`);
      add(ofPlate, refKey(plate), `${seatedAt} ${sameName(mount.name)}`);
    }
  }
  return { ofMount, ofPlate };
}

/** A plate without its seats. */
export function headOf(plate: DocumentPlate): DocumentPlateHead {
  return {
    name: plate.name,
    kind: plate.kind,
    designWavelengthNm: plate.designWavelengthNm,
    construction: plate.construction,
    material: plate.material,
    order: plate.order,
    serial: plate.serial,
    clearApertureMm: plate.clearApertureMm,
    coatingNm: plate.coatingNm,
    damageNote: plate.damageNote,
    note: plate.note,
    retiredAt: plate.retiredAt,
  };
}

export const refOf = ({ name, retiredAt }: DocumentRef): DocumentRef => ({ name, retiredAt });

/** The fields in which two mounts, or two plates, differ, in the order of their names. */
export function fieldChanges<Part extends DocumentMount | DocumentPlateHead>(
  before: Part,
  after: Part,
): FieldChange[] {
  const [old, fresh] = [new Map(fieldsOf(before)), new Map(fieldsOf(after))];
  return [...old.keys()].toSorted().flatMap((field) => {
    const change = { field, before: old.get(field) ?? null, after: fresh.get(field) ?? null };
    return sameValue(change.before, change.after) ? [] : [change];
  });
}

function fieldsOf(part: DocumentMount | DocumentPlateHead): readonly (readonly [string, FieldValue])[] {
  return Object.entries(part);
}

function sameValue(one: FieldValue, other: FieldValue): boolean {
  if (!isRecord(one) || !isRecord(other)) return one === other;
  return one.from === other.from && one.to === other.to;
}
