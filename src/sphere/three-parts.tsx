import { Line } from '@react-three/drei';
import { useLayoutEffect, useMemo } from 'react';
import {
  BufferGeometry,
  Color,
  Float32BufferAttribute,
  GreaterDepth,
  LessEqualDepth,
  ShaderMaterial,
  Vector2,
} from 'three';
import type { Palette } from './palette';
import { DOTS_PX, LIMB, type LineRole, SHADE, STROKES } from './strokes';
import { limbTicks } from './limb';
import type { Vec3 } from './vec';

/*
 * What is hidden: a plane through the middle, facing the viewer, is written to the depth buffer alone. Fragments nearer than
 * it are the front, the others the back; each line is drawn once for either. That cuts exactly at the limb for any view.
 */
const ORDER = { shade: 0, plane: 1, back: 2, under: 3, halo: 4, front: 5, ring: 6 } as const;

/** Opacity as a mixture with the body: where segments of one line overlap, a transparent line would show beads. */
function mixed(palette: Palette, token: keyof Palette, opacity: number): string {
  if (opacity >= 1) return palette[token];
  const channels = [1, 3, 5].map((at) => {
    const over = Number.parseInt(palette[token].slice(at, at + 2), 16);
    const under = Number.parseInt(palette.glass.slice(at, at + 2), 16);
    return Math.round(under + (over - under) * opacity)
      .toString(16)
      .padStart(2, '0');
  });
  return `#${channels.join('')}`;
}

function mutable(points: readonly Vec3[]): [number, number, number][] {
  return points.map(([x, y, z]) => [x, y, z]);
}

interface SideLinesProps {
  readonly points: readonly Vec3[];
  readonly segments?: boolean;
  readonly role: LineRole;
  readonly palette: Palette;
  readonly radiusPx: number;
}

/** A pattern of many short strokes: the card's own lines, one thing in front and one behind. */
export function HairSegments({ points, role, palette }: Pick<SideLinesProps, 'points' | 'role' | 'palette'>) {
  const stroke = STROKES[role];
  const geometry = useMemo(
    () => new BufferGeometry().setAttribute('position', new Float32BufferAttribute(points.flat(), 3)),
    [points],
  );
  useLayoutEffect(() => () => geometry.dispose(), [geometry]);
  const sides = [
    { side: 'back', opacity: stroke.backOpacity, depthFunc: GreaterDepth, order: ORDER.back },
    { side: 'front', opacity: stroke.frontOpacity, depthFunc: LessEqualDepth, order: ORDER.under },
  ] as const;
  return sides.map(({ side, opacity, depthFunc, order }) =>
    opacity === null ? null : (
      <lineSegments key={side} geometry={geometry} renderOrder={order}>
        <lineBasicMaterial
          color={mixed(palette, stroke.token, opacity)}
          transparent
          depthWrite={false}
          depthFunc={depthFunc}
          toneMapped={false}
        />
      </lineSegments>
    ),
  );
}

/** One line, or many segments of one kind, in front of the limb plane and behind it. */
export function SideLines({ points, segments = false, role, palette, radiusPx }: SideLinesProps) {
  const stroke = STROKES[role];
  const list = useMemo(() => mutable(points), [points]);
  return (
    <>
      {stroke.backOpacity !== null && (
        <Line
          points={list}
          segments={segments}
          color={mixed(palette, stroke.token, stroke.backOpacity)}
          lineWidth={stroke.widthPx}
          dashed={stroke.backDotted}
          dashSize={DOTS_PX.mark / radiusPx}
          gapSize={DOTS_PX.gap / radiusPx}
          transparent
          depthWrite={false}
          depthFunc={GreaterDepth}
          toneMapped={false}
          renderOrder={ORDER.back}
        />
      )}
      {stroke.haloPx > 0 && (
        <Line
          points={list}
          segments={segments}
          color={palette.glass}
          lineWidth={stroke.widthPx + 2 * stroke.haloPx}
          transparent
          depthWrite={false}
          depthFunc={LessEqualDepth}
          toneMapped={false}
          renderOrder={ORDER.halo}
        />
      )}
      <Line
        points={list}
        segments={segments}
        color={mixed(palette, stroke.token, stroke.frontOpacity)}
        lineWidth={stroke.widthPx}
        transparent
        depthWrite={false}
        depthFunc={LessEqualDepth}
        toneMapped={false}
        renderOrder={ORDER.front}
      />
    </>
  );
}

const VERTEX = /* glsl */ `
varying vec2 vAt;
void main() {
  vAt = position.xy;
  gl_Position = projectionMatrix * modelViewMatrix * vec4(position, 1.0);
}`;

// Colours come in as they are written in the style sheet and go out so: no colour space in between.
const FRAGMENT = /* glsl */ `
uniform vec3 glass;
uniform vec3 wash;
uniform vec2 centre;
uniform float reach;
uniform float start;
varying vec2 vAt;
void main() {
  float t = clamp((distance(vAt, centre) / reach - start) / (1.0 - start), 0.0, 1.0);
  gl_FragColor = vec4(mix(glass, wash, t), 1.0);
}`;

/** An sRGB colour as written, without the conversion that three makes for its own materials. */
function written(hex: string): Color {
  return new Color().setStyle(hex, 'srgb-linear');
}

/** What faces the viewer whatever the view: the body's shade, the limb plane, and the ring with its ticks. */
export function FacingParts({ palette }: { readonly palette: Palette }) {
  const shade = useMemo(
    () =>
      new ShaderMaterial({
        vertexShader: VERTEX,
        fragmentShader: FRAGMENT,
        transparent: true,
        depthTest: false,
        depthWrite: false,
        uniforms: {
          glass: { value: written(palette.glass) },
          wash: { value: written(palette.wash) },
          centre: { value: new Vector2(SHADE.centreX, -SHADE.centreY) },
          reach: { value: SHADE.radius },
          start: { value: SHADE.from },
        },
      }),
    [palette],
  );
  useLayoutEffect(() => () => shade.dispose(), [shade]);
  return (
    <>
      <mesh material={shade} renderOrder={ORDER.shade}>
        <circleGeometry args={[1, 96]} />
      </mesh>
      <mesh renderOrder={ORDER.plane}>
        <planeGeometry args={[4, 4]} />
        <meshBasicMaterial transparent colorWrite={false} depthWrite />
      </mesh>
      <PageLine points={CIRCLE} color={palette.ink} width={1} />
      <PageLine points={RING} color={palette.rule} width={0.8} />
      <PageLine points={RING_TICKS} segments color={palette.rule} width={0.8} />
    </>
  );
}

function circle(radius: number): [number, number, number][] {
  return Array.from({ length: 121 }, (_, k) => {
    const angle = (k * Math.PI) / 60;
    return [radius * Math.cos(angle), radius * Math.sin(angle), 0];
  });
}
const CIRCLE = circle(1);
const RING = circle(LIMB.ringRadius);
const RING_TICKS = limbTicks().flatMap(({ from, to }): [number, number, number][] => [
  [from.x, -from.y, 0],
  [to.x, -to.y, 0],
]);

function PageLine({
  points,
  segments = false,
  color,
  width,
}: {
  readonly points: [number, number, number][];
  readonly segments?: boolean;
  readonly color: string;
  readonly width: number;
}) {
  return (
    <Line
      points={points}
      segments={segments}
      color={color}
      lineWidth={width}
      transparent
      depthTest={false}
      depthWrite={false}
      toneMapped={false}
      renderOrder={ORDER.ring}
    />
  );
}
