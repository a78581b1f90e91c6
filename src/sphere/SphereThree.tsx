import { OrthographicCamera } from '@react-three/drei';
import { Canvas, useFrame, useThree } from '@react-three/fiber';
import { useEffect, useLayoutEffect, useMemo, useRef, useState } from 'react';
import { Matrix4, Quaternion } from 'three';
import { type Palette, usePalette } from './palette';
import type { SceneLine, SceneTicks, SphereScene } from './scene';
import { SphereMarks } from './SphereMarks';
import { STROKES } from './strokes';
import { FacingParts, HairSegments, SideLines } from './three-parts';
import type { Placement, SphereView, ViewFrame } from './view';
import { scale, type Vec3 } from './vec';

interface Props {
  readonly scene: SphereScene;
  readonly view: SphereView;
  readonly frame: ViewFrame;
  readonly place: Placement;
  /** Software drawing gets one pixel per pixel: its time goes with the area. */
  readonly software: boolean;
  readonly onReady: () => void;
  readonly onLost: () => void;
}

const CAMERA_DISTANCE = 10;
type Dpr = number | [number, number];
const HARDWARE_DPR: Dpr = [1, 1.5];

/** The sphere's lines in WebGL, drawn only when something changed; its signs and words lie over it as in the SVG. */
export default function SphereThree({ scene, view, frame, place, software, onReady, onLost }: Props) {
  const [root, setRoot] = useState<HTMLDivElement | null>(null);
  const palette = usePalette(root);
  return (
    <div ref={setRoot} className="sphere-three">
      {palette !== undefined && (
        <Canvas
          frameloop="demand"
          flat
          dpr={software ? 1 : HARDWARE_DPR}
          gl={{ antialias: true, alpha: true, powerPreference: 'low-power' }}
          resize={{ scroll: false, debounce: 0 }}
          aria-hidden="true"
        >
          <WatchContext onLost={onLost} />
          <SphereContent scene={scene} frame={frame} place={place} palette={palette} view={view} />
          <TellFirstFrame onReady={onReady} />
        </Canvas>
      )}
      <svg
        className="sphere-drawing"
        width={place.width}
        height={place.height}
        viewBox={`0 0 ${place.width} ${place.height}`}
        aria-hidden="true"
        focusable="false"
      >
        <SphereMarks scene={scene} frame={frame} place={place} />
      </svg>
    </div>
  );
}

function SphereContent({
  scene,
  frame,
  place,
  palette,
}: Pick<Props, 'scene' | 'frame' | 'place' | 'view'> & { readonly palette: Palette }) {
  const invalidate = useThree((state) => state.invalidate);
  const facing = useMemo(() => facingQuaternion(frame), [frame]);
  const cameraAt = useMemo(() => tuple(scale(frame.toViewer, CAMERA_DISTANCE)), [frame]);
  useLayoutEffect(() => invalidate(), [invalidate, scene, frame, place, palette]);

  const body = useMemo(() => bodySegments(scene), [scene]);
  const turns = scene.lines.filter(({ role }) => role === 'turn' || role === 'last-turn');
  return (
    <>
      <OrthographicCamera
        makeDefault
        position={cameraAt}
        quaternion={facing}
        zoom={place.radius}
        near={0.1}
        far={2 * CAMERA_DISTANCE}
      />
      <group quaternion={facing}>
        <FacingParts palette={palette} />
      </group>
      <SideLines
        points={body.graticule}
        segments
        role="graticule"
        palette={palette}
        radiusPx={place.radius}
      />
      <SideLines points={body.equator} segments role="equator" palette={palette} radiusPx={place.radius} />
      {scene.ticks.map((ticks) => (
        <Ticks key={ticks.id} ticks={ticks} palette={palette} radiusPx={place.radius} />
      ))}
      {turns.map((line) => (
        <SideLines
          key={`${line.id}/${line.points.length}`}
          points={line.points}
          role={line.role}
          palette={palette}
          radiusPx={place.radius}
        />
      ))}
    </>
  );
}

function Ticks({
  ticks: { role, segments },
  palette,
  radiusPx,
}: {
  readonly ticks: SceneTicks;
  readonly palette: Palette;
  readonly radiusPx: number;
}) {
  const points = useMemo(() => segments.flat(), [segments]);
  if (points.length === 0) return null;
  if (STROKES[role].hairline === true) return <HairSegments points={points} role={role} palette={palette} />;
  return (
    <SideLines
      key={points.length}
      points={points}
      segments
      role={role}
      palette={palette}
      radiusPx={radiusPx}
    />
  );
}

function tuple([x, y, z]: Vec3): [number, number, number] {
  return [x, y, z];
}

function facingQuaternion({ right, up, toViewer }: ViewFrame): Quaternion {
  const matrix = new Matrix4().set(
    right[0],
    up[0],
    toViewer[0],
    0,
    right[1],
    up[1],
    toViewer[1],
    0,
    right[2],
    up[2],
    toViewer[2],
    0,
    0,
    0,
    0,
    1,
  );
  return new Quaternion().setFromRotationMatrix(matrix);
}

/** All lines of a kind as separate segments, so that the whole graticule is two draws. */
function bodySegments(scene: SphereScene): { graticule: Vec3[]; equator: Vec3[] } {
  const segmentsOf = (lines: readonly SceneLine[]): Vec3[] =>
    lines.flatMap(({ points }) =>
      points.slice(1).flatMap((point, index) => {
        const previous = points[index];
        return previous === undefined ? [] : [previous, point];
      }),
    );
  return {
    graticule: segmentsOf(scene.lines.filter(({ role }) => role === 'graticule')),
    equator: segmentsOf(scene.lines.filter(({ role }) => role === 'equator')),
  };
}

/** A context that the browser takes away leaves a blank canvas: the SVG takes over. */
function WatchContext({ onLost }: Pick<Props, 'onLost'>) {
  const canvas = useThree((state) => state.gl.domElement);
  useEffect(() => {
    canvas.addEventListener('webglcontextlost', onLost);
    return () => canvas.removeEventListener('webglcontextlost', onLost);
  }, [canvas, onLost]);
  return null;
}

function TellFirstFrame({ onReady }: Pick<Props, 'onReady'>) {
  const told = useRef(false);
  useFrame(() => {
    if (told.current) return;
    told.current = true;
    // This runs before the frame is drawn; by the next one it is on the page.
    requestAnimationFrame(onReady);
  });
  return null;
}
