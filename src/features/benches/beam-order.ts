import { type BenchPart, benchParts, maxBenchPlates } from '../../../shared/schemas/benches';

/** A plate's place in the beam. `key` stays with it wherever it is moved, also where one plate stands twice. */
export interface Place {
  readonly key: string;
  readonly plateId: string;
}

/** Both parts of one beam, each in the order that light meets its plates. */
export type Beam = Readonly<Record<BenchPart, readonly Place[]>>;

export interface Spot {
  readonly part: BenchPart;
  readonly index: number;
}

export const emptyBeam: Beam = { preparation: [], analysis: [] };

export const partNames: Readonly<Record<BenchPart, string>> = {
  preparation: 'preparation',
  analysis: 'analysis',
};

export function spotOf(beam: Beam, key: string): Spot | null {
  for (const part of benchParts) {
    const index = beam[part].findIndex((place) => place.key === key);
    if (index >= 0) return { part, index };
  }
  return null;
}

export function isFull(beam: Beam, part: BenchPart): boolean {
  return beam[part].length >= maxBenchPlates;
}

function without(beam: Beam, key: string): Beam {
  const rest = (part: BenchPart) => beam[part].filter((place) => place.key !== key);
  return { preparation: rest('preparation'), analysis: rest('analysis') };
}

function withPlace(beam: Beam, place: Place, { part, index }: Spot): Beam {
  return { ...beam, [part]: beam[part].toSpliced(index, 0, place) };
}

/**
 * Puts a place before the one that stands at `to` now, or behind all of a part where `to` is past its end. The beam comes
 * back as it is where that part is full.
 */
export function moveTo(beam: Beam, key: string, to: Spot): Beam {
  const from = spotOf(beam, key);
  const place = from === null ? undefined : beam[from.part][from.index];
  if (from === null || place === undefined) return beam;
  if (from.part !== to.part && isFull(beam, to.part)) return beam;
  const isBehind = from.part === to.part && from.index < to.index;
  const index = isBehind ? to.index - 1 : to.index;
  if (from.part === to.part && from.index === index) return beam;
  return withPlace(without(beam, key), place, { part: to.part, index });
}

/** One place on along the light, or back towards the source; from one part into the other at their border. */
export function moveBy(beam: Beam, key: string, step: 1 | -1): Beam {
  const from = spotOf(beam, key);
  if (from === null) return beam;
  const { part, index } = from;
  const next = index + step;
  if (next >= 0 && next < beam[part].length) {
    return moveTo(beam, key, { part, index: step === 1 ? next + 1 : next });
  }
  if (part === 'preparation') return step === 1 ? moveTo(beam, key, { part: 'analysis', index: 0 }) : beam;
  return step === -1 ? moveTo(beam, key, { part: 'preparation', index: beam.preparation.length }) : beam;
}

/** A plate behind all others of a part. */
export function append(beam: Beam, part: BenchPart, plateId: string): Beam {
  let key = plateId;
  for (let copy = 2; spotOf(beam, key) !== null; copy += 1) key = `${plateId} ${copy}`;
  return isFull(beam, part) ? beam : withPlace(beam, { key, plateId }, { part, index: beam[part].length });
}

/** What was taken out of a beam, and from where. */
export interface Taken {
  readonly place: Place;
  readonly spot: Spot;
}

export function takeOut(beam: Beam, key: string): { readonly beam: Beam; readonly taken: Taken | null } {
  const spot = spotOf(beam, key);
  const place = spot === null ? undefined : beam[spot.part][spot.index];
  return spot === null || place === undefined
    ? { beam, taken: null }
    : { beam: without(beam, key), taken: { place, spot } };
}

/** Back to where it stood, or as near as the part now reaches; the beam as it is where there is no more room. */
export function putBack(beam: Beam, { place, spot }: Taken): Beam {
  if (isFull(beam, spot.part) || spotOf(beam, place.key) !== null) return beam;
  return withPlace(beam, place, { ...spot, index: Math.min(spot.index, beam[spot.part].length) });
}

/** "2 of 3 in preparation". */
export function spotWords(beam: Beam, key: string): string {
  const spot = spotOf(beam, key);
  if (spot === null) return 'not in the beam';
  return `${spot.index + 1} of ${beam[spot.part].length} in ${partNames[spot.part]}`;
}
