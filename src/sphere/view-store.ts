import { createStore } from 'zustand/vanilla';
import type { Convention } from '../../shared/optics/convention';
import { clampLatitude, HOME_VIEW, type SphereView, wrapLongitude } from './view';
import { applyCommand, type ViewCommand } from './view-keys';

interface SphereViewState {
  readonly view: SphereView;
  readonly apply: (command: ViewCommand, convention: Convention) => void;
  /** Turns the view by angles on the sphere, as a drag does; nothing needs it. */
  readonly turnBy: (longitudeDeg: number, latitudeDeg: number) => void;
}

/** A page keeps one, so that its sphere stays turned when another row is chosen. */
export function createSphereViewStore(initial: SphereView = HOME_VIEW) {
  return createStore<SphereViewState>()((set) => ({
    view: initial,
    apply: (command, convention) => set(({ view }) => ({ view: applyCommand(view, command, convention) })),
    turnBy: (longitudeDeg, latitudeDeg) =>
      set(({ view }) => ({
        view: {
          ...view,
          longitudeDeg: wrapLongitude(view.longitudeDeg + longitudeDeg),
          latitudeDeg: clampLatitude(view.latitudeDeg + latitudeDeg),
        },
      })),
  }));
}

export type SphereViewStore = ReturnType<typeof createSphereViewStore>;
