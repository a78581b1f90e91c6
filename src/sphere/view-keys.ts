import { counterClockwiseLetter, type Convention } from '../../shared/optics/convention';
import { clampLatitude, HOME_VIEW, type SphereView, wrapLongitude, ZOOM_LIMITS } from './view';

export type TurnWay = 'left' | 'right' | 'up' | 'down';
export type FacedBasis = 'hv' | 'da' | 'rl';

/** One thing that a key or a button does to the view. */
export type ViewCommand =
  | { readonly do: 'turn'; readonly way: TurnWay; readonly byDeg: number }
  | { readonly do: 'face'; readonly basis: FacedBasis }
  | { readonly do: 'zoom'; readonly way: 'in' | 'out' }
  | { readonly do: 'home' };

export const TURN_STEP_DEG = 5;
export const FINE_TURN_STEP_DEG = 1;
const ZOOM_STEP = 1.25;

const ARROWS: Readonly<Record<string, TurnWay>> = {
  ArrowLeft: 'left',
  ArrowRight: 'right',
  ArrowUp: 'up',
  ArrowDown: 'down',
};
const FACES: Readonly<Record<string, FacedBasis>> = { h: 'hv', d: 'da', r: 'rl' };

/** What a key means to the focused figure; undefined for keys that are not its own. */
export function commandForKey(event: {
  readonly key: string;
  readonly shiftKey: boolean;
  readonly ctrlKey: boolean;
  readonly metaKey: boolean;
  readonly altKey: boolean;
}): ViewCommand | undefined {
  if (event.ctrlKey || event.metaKey || event.altKey) return undefined;
  const way = ARROWS[event.key];
  if (way !== undefined)
    return { do: 'turn', way, byDeg: event.shiftKey ? FINE_TURN_STEP_DEG : TURN_STEP_DEG };
  const basis = FACES[event.key.toLowerCase()];
  if (basis !== undefined) return { do: 'face', basis };
  if (event.key === '0') return { do: 'home' };
  if (event.key === '+' || event.key === '=') return { do: 'zoom', way: 'in' };
  if (event.key === '-' || event.key === '\u2212') return { do: 'zoom', way: 'out' };
  return undefined;
}

/** An arrow turns the sphere the way it points: to the right brings what was on the left to the front. */
export function applyCommand(view: SphereView, command: ViewCommand, convention: Convention): SphereView {
  switch (command.do) {
    case 'turn':
      return turnedView(view, command.way, command.byDeg);
    case 'face':
      return facedView(view, command.basis, convention);
    case 'zoom': {
      const zoom = command.way === 'in' ? view.zoom * ZOOM_STEP : view.zoom / ZOOM_STEP;
      return { ...view, zoom: Math.min(ZOOM_LIMITS.max, Math.max(ZOOM_LIMITS.min, zoom)) };
    }
    case 'home':
      return HOME_VIEW;
  }
}

function turnedView(view: SphereView, way: TurnWay, byDeg: number): SphereView {
  switch (way) {
    case 'left':
      return { ...view, longitudeDeg: wrapLongitude(view.longitudeDeg + byDeg) };
    case 'right':
      return { ...view, longitudeDeg: wrapLongitude(view.longitudeDeg - byDeg) };
    case 'up':
      return { ...view, latitudeDeg: clampLatitude(view.latitudeDeg - byDeg) };
    case 'down':
      return { ...view, latitudeDeg: clampLatitude(view.latitudeDeg + byDeg) };
  }
}

/** The first state of the pair in the middle of the drawing, or the second where the first is there already. */
function facedView(view: SphereView, basis: FacedBasis, convention: Convention): SphereView {
  const [first, second] = faces(basis, convention);
  const isFirst = view.longitudeDeg === first.longitudeDeg && view.latitudeDeg === first.latitudeDeg;
  return { ...view, ...(isFirst ? second : first) };
}

type Facing = Pick<SphereView, 'longitudeDeg' | 'latitudeDeg'>;

function faces(basis: FacedBasis, convention: Convention): readonly [Facing, Facing] {
  switch (basis) {
    case 'hv':
      return [
        { longitudeDeg: 0, latitudeDeg: 0 },
        { longitudeDeg: 180, latitudeDeg: 0 },
      ];
    case 'da':
      return [
        { longitudeDeg: 90, latitudeDeg: 0 },
        { longitudeDeg: -90, latitudeDeg: 0 },
      ];
    case 'rl': {
      // From above a pole H is to the right and D up, as on the table; from below the pole D is down.
      const north: Facing = { longitudeDeg: -90, latitudeDeg: 90 };
      const south: Facing = { longitudeDeg: -90, latitudeDeg: -90 };
      return counterClockwiseLetter(convention) === 'R' ? [north, south] : [south, north];
    }
  }
}
