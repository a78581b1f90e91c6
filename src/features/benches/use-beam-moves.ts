import { type KeyboardEvent, useEffect, useRef, useState } from 'react';
import type { BenchPart } from '../../../shared/schemas/benches';
import { announce } from '../../components/live-region-store';
import {
  append,
  type Beam,
  isFull,
  moveBy,
  moveTo,
  partNames,
  putBack,
  type Spot,
  spotOf,
  spotWords,
  takeOut,
  type Taken,
} from './beam-order';

/** A plate that the keyboard holds, and the beam as it was when it was grabbed. */
interface Grabbed {
  readonly key: string;
  readonly before: Beam;
}

const arrowSteps: Readonly<Record<string, 1 | -1>> = {
  ArrowUp: -1,
  ArrowLeft: -1,
  ArrowDown: 1,
  ArrowRight: 1,
};

interface BeamMovesOptions {
  readonly beam: Beam;
  readonly onBeam: (beam: Beam) => void;
  readonly list: HTMLElement | null;
  readonly nameOf: (key: string) => string;
}

/** Everything that a hand on the keyboard, or a plain button, does to a beam, each said in words. */
export function useBeamMoves({ beam, onBeam, list, nameOf }: BeamMovesOptions) {
  const [grabbed, setGrabbed] = useState<Grabbed | null>(null);
  const [taken, setTaken] = useState<(Taken & { readonly name: string }) | null>(null);
  // A row that moves, or goes, takes the focus with it: where it belongs once the list is drawn again.
  const wanted = useRef<string | null>(null);
  useEffect(() => {
    if (wanted.current === null) return;
    list?.querySelector<HTMLElement>(wanted.current)?.focus();
    wanted.current = null;
  });
  const focusOn = (key: string, control: 'grip' | 'up' | 'down') => {
    wanted.current = `[data-place="${key}"] [data-control="${control}"]`;
  };

  const stand = (next: Beam, key: string, control: 'grip' | 'up' | 'down') => {
    onBeam(next);
    focusOn(key, control);
    announce(`${nameOf(key)}: ${spotWords(next, key)}.`);
  };

  const step = (key: string, by: 1 | -1, control: 'grip' | 'up' | 'down') => {
    const next = moveBy(beam, key, by);
    if (next === beam) announce(whyNot(beam, key, by, nameOf(key)));
    else stand(next, key, control);
  };

  const letGo = (key: string) => {
    setGrabbed(null);
    announce(`${nameOf(key)} dropped, ${spotWords(beam, key)}.`);
  };

  const toggle = (key: string) => {
    if (grabbed?.key === key) {
      letGo(key);
      return;
    }
    setGrabbed({ key, before: beam });
    announce(
      `${nameOf(key)} grabbed, ${spotWords(beam, key)}. Up and Down move it, Space drops it, Escape puts it back.`,
    );
  };

  const press = (key: string) => (event: KeyboardEvent) => {
    if (grabbed?.key !== key) return;
    const by = arrowSteps[event.key];
    if (event.key === 'Escape') {
      event.preventDefault();
      setGrabbed(null);
      onBeam(grabbed.before);
      focusOn(key, 'grip');
      announce(`${nameOf(key)} put back, ${spotWords(grabbed.before, key)}.`);
    } else if (by !== undefined) {
      event.preventDefault();
      step(key, by, 'grip');
    }
  };

  /** Focus that goes elsewhere lets the plate stand where it is; the move itself blurs too, and brings the focus back. */
  const leave = (key: string) => () => {
    window.setTimeout(() => {
      const holder = document.activeElement?.closest('[data-place]');
      if (holder?.getAttribute('data-place') !== key) setGrabbed(null);
    });
  };

  const drop = (key: string, to: Spot) => {
    const next = moveTo(beam, key, to);
    const from = spotOf(beam, key);
    if (next !== beam) stand(next, key, 'grip');
    else if (from !== null && from.part !== to.part) announce(fullWords(to.part));
  };

  return {
    grabbedKey: grabbed?.key ?? null,
    taken,
    toggle,
    press,
    leave,
    drop,
    up: (key: string) => step(key, -1, 'up'),
    down: (key: string) => step(key, 1, 'down'),
    add: (part: BenchPart, plateId: string, name: string) => {
      if (isFull(beam, part)) {
        announce(fullWords(part));
        return;
      }
      const next = append(beam, part, plateId);
      onBeam(next);
      announce(`${name} put behind the plates of ${partNames[part]}, ${next[part].length} of them now.`);
    },
    remove: (key: string) => {
      const gone = takeOut(beam, key);
      if (gone.taken === null) return;
      const { part, index } = gone.taken.spot;
      const neighbour = gone.beam[part][index] ?? gone.beam[part][index - 1];
      wanted.current =
        neighbour === undefined
          ? `[data-part="${part}"] [role="combobox"]`
          : `[data-place="${neighbour.key}"] [data-control="grip"]`;
      setGrabbed(null);
      setTaken({ ...gone.taken, name: nameOf(key) });
      onBeam(gone.beam);
    },
    undo: () => {
      if (taken !== null) stand(putBack(beam, taken), taken.place.key, 'grip');
    },
    forget: () => setTaken(null),
  };
}

export type BeamMoves = ReturnType<typeof useBeamMoves>;

function fullWords(part: BenchPart): string {
  return `There is no more room in ${partNames[part]}: six plates are the most that a part has.`;
}

function whyNot(beam: Beam, key: string, by: 1 | -1, name: string): string {
  const spot = spotOf(beam, key);
  if (spot?.part === 'preparation' && by === 1) return fullWords('analysis');
  if (spot?.part === 'analysis' && by === -1) return fullWords('preparation');
  return by === -1 ? `${name} is the first that light meets.` : `${name} is the last that light meets.`;
}
