import { SectionHead } from '../../components/SectionHead';
import { DEFAULT_CONVENTION } from '../../../shared/optics/convention';
import { path } from '../../../shared/optics/retarder';
import type { Stokes } from '../../../shared/optics/stokes';
import { degrees, toRadians } from '../../../shared/optics/units';
import { Sphere, type SphereInput } from '../../sphere';

const convention = DEFAULT_CONVENTION;
const h: Stokes = [1, 0, 0];
const preparing = [
  { name: 'H-3', fastAxisDeg: 71.1, retardanceDeg: 179.2 },
  { name: 'Q-B', fastAxisDeg: 114.73, retardanceDeg: 86.9 },
];
const wholeTurn = [{ name: 'F-1', fastAxisDeg: 25, retardanceDeg: 360 }];

const sixStates: readonly { readonly label: string; readonly state: Stokes }[] = [
  { label: 'H', state: h },
  { label: 'V', state: [-1, 0, 0] },
  { label: 'D', state: [0, 1, 0] },
  { label: 'A', state: [0, -1, 0] },
  { label: 'R', state: [0, 0, -1] },
  { label: 'L', state: [0, 0, 1] },
];

/** Quarter, half, quarter for a Hadamard gate, with retardances as they might be calibrated. */
const applying = [
  { name: 'Q-A', fastAxisDeg: 22.5, retardanceDeg: 91.2 },
  { name: 'H-1', fastAxisDeg: 22.5, retardanceDeg: 177.1 },
  { name: 'Q-B', fastAxisDeg: 112.5, retardanceDeg: 86.9 },
];

function behind(plates: SphereInput['plates'], from: Stokes): Stokes {
  const retarders = plates.map(({ retardanceDeg, fastAxisDeg }) => ({
    retardanceRad: toRadians(degrees(retardanceDeg)),
    fastAxisRad: toRadians(degrees(fastAxisDeg)),
  }));
  return path(from, retarders, toRadians(degrees(90))).statesAfter.at(-1) ?? from;
}

const third = 1 / 3;
const tetrahedron: readonly { readonly label: string; readonly state: Stokes }[] = [
  { label: 't0', state: h },
  { label: 't1', state: [-third, Math.sqrt(8) * third, 0] },
  { label: 't2', state: [-third, -Math.sqrt(2) * third, Math.sqrt(6) * third] },
  { label: 't3', state: [-third, -Math.sqrt(2) * third, -Math.sqrt(6) * third] },
];

const greatCircle = Array.from({ length: 36 }, (_, k) => {
  const turn = (k * Math.PI) / 18;
  const state: Stokes = [Math.cos(turn), Math.sin(turn) * Math.SQRT1_2, Math.sin(turn) * Math.SQRT1_2];
  return { label: `g${k + 1}`, state };
});

/** An invented map: nothing near the poles, two ways in a belt beside them, four elsewhere. */
function beltMap(outBeyondDeg: number, twoBeyondDeg: number, stepDeg: number): SphereInput['reach'] {
  const rows = Array.from({ length: 180 / stepDeg }, (_, row) => -90 + (row + 0.5) * stepDeg);
  const columns = Array.from({ length: 360 / stepDeg }, (_, column) => (column + 0.5) * stepDeg);
  return {
    stepDeg,
    cells: rows.flatMap((latitudeDeg) =>
      columns.map((longitudeDeg) => {
        const [lat, lon] = [(latitudeDeg * Math.PI) / 180, (longitudeDeg * Math.PI) / 180];
        const centre: Stokes = [Math.cos(lat) * Math.cos(lon), Math.cos(lat) * Math.sin(lon), Math.sin(lat)];
        const edge = Math.abs(latitudeDeg) - 6 * Math.cos(2 * lon);
        return {
          centre,
          latitudeDeg,
          longitudeDeg,
          count: edge > outBeyondDeg ? 0 : edge > twoBeyondDeg ? 2 : 4,
        };
      }),
    ),
  };
}

const states: readonly { readonly title: string; readonly note: string; readonly input: SphereInput }[] = [
  {
    title: 'One path',
    note: 'from H to the target',
    input: {
      start: h,
      plates: preparing,
      target: { label: 't2', state: tetrahedron[2]?.state ?? h },
      convention,
    },
  },
  {
    title: 'A target on a basis state',
    note: 'both names are to be read',
    input: {
      start: h,
      plates: [{ name: 'H-3', fastAxisDeg: 22.3, retardanceDeg: 179.2 }],
      target: { label: 'd+', state: [0, 1, 0] },
      convention,
    },
  },
  {
    title: 'Phase along a path',
    note: 'flags',
    input: { start: h, plates: preparing, phase: true, convention },
  },
  {
    title: 'A full turn',
    note: 'the flag comes back the other way',
    input: { start: h, plates: wholeTurn, phase: true, convention },
  },
  {
    title: 'A unitary',
    note: 'where six reference states go',
    input: {
      start: h,
      plates: applying,
      images: sixStates.map(({ label, state }) => ({
        label,
        from: state,
        // A Hadamard gate changes H with D and V with A, and turns L into R.
        wanted: [state[1], state[0], -state[2]] as const,
        reached: behind(applying, state),
      })),
      convention,
    },
  },
  {
    title: 'Out of reach',
    note: 'an invented map',
    input: { start: h, plates: [], reach: beltMap(64, 52, 2), convention },
  },
  {
    title: 'A small gap at the poles',
    note: 'a finer map, another start',
    input: { start: [0.6, 0.8, 0], plates: [], reach: beltMap(83, 78, 1), convention },
  },
  {
    title: 'Six states',
    note: 'a set before it is added',
    input: { start: h, plates: [], points: sixStates, convention },
  },
  { title: 'A tetrahedron', note: 'named', input: { start: h, plates: [], points: tetrahedron, convention } },
  {
    title: 'A great circle',
    note: 'too many to name',
    input: { start: h, plates: [], points: greatCircle, convention },
  },
  { title: 'Nothing yet', note: 'no plates, no target', input: { start: h, plates: [], convention } },
];

/** The sphere in its states, by day and in the dark room. */
export function SphereParts() {
  return (
    <section aria-labelledby="spheres" className="space-y-6 px-5 pb-20 sm:px-10">
      <SectionHead id="spheres" note="lines in 3D where there is WebGL, else the same as SVG">
        The sphere of states
      </SectionHead>
      <div className="grid grid-cols-[minmax(0,1fr)] gap-10 desk:grid-cols-[repeat(2,minmax(0,1fr))]">
        {states.map(({ title, note, input }) => (
          <SphereState key={title} title={title} note={note} input={input} />
        ))}
      </div>
      <div
        data-theme="dark-room"
        className="grid grid-cols-[minmax(0,1fr)] gap-10 p-6 desk:grid-cols-[repeat(2,minmax(0,1fr))]"
      >
        {states.slice(2, 6).map(({ title, note, input }) => (
          <SphereState key={title} title={title} note={note} input={input} />
        ))}
      </div>
    </section>
  );
}

function SphereState({ title, note, input }: (typeof states)[number]) {
  return (
    <figure className="m-0 min-w-0" data-sphere-state={title}>
      <figcaption className="mb-2">
        <b>{title}</b> <span className="text-ink-2">{note}</span>
      </figcaption>
      <Sphere input={input} />
    </figure>
  );
}
