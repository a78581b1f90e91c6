import { LIMB } from './strokes';

/** A point of the page, in radii of the sphere from its centre, y down. */
export interface PagePoint {
  readonly x: number;
  readonly y: number;
}

/** Ticks of the limb ring in radii of the sphere, on the page. */
export function limbTicks(): { from: PagePoint; to: PagePoint }[] {
  return Array.from({ length: 360 / LIMB.tickStepDeg }, (_, k) => {
    const angleDeg = k * LIMB.tickStepDeg;
    const angle = (angleDeg * Math.PI) / 180;
    const end = angleDeg % LIMB.longTickStepDeg === 0 ? LIMB.longTick : LIMB.shortTick;
    const [sin, cos] = [Math.sin(angle), Math.cos(angle)];
    return {
      from: { x: sin * LIMB.ringRadius, y: -cos * LIMB.ringRadius },
      to: { x: sin * end, y: -cos * end },
    };
  });
}
