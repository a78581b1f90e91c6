import { memo } from 'react';
import type { DialScale } from '../../shared/optics/dial';
import type { ViewedFrom } from './dial-words';
import { polar, radial } from './polar';
import { ringTicks, seenAngle } from './ring-geometry';

interface RingScaleProps {
  readonly radius: number;
  readonly scale: Pick<DialScale, 'offsetDeg' | 'direction'>;
  readonly viewedFrom: ViewedFrom;
  readonly indexAt: number;
  readonly numbersEveryDeg: number | null;
  readonly stepDeg: number;
  /** The mount's turn as it is seen, running on past full turns. */
  readonly seenTurn: number;
  readonly quiet: boolean;
}

/** The graduated ring. It is drawn once for the mount at rest and turned as a whole, so that it moves as one piece. */
export function RingScale({ seenTurn, ...rest }: RingScaleProps) {
  return (
    <g className="motion-ring" style={{ transform: `rotate(${-seenTurn}deg)` }}>
      <Engraving {...rest} />
    </g>
  );
}

const Engraving = memo(function Engraving({
  radius,
  scale: { offsetDeg, direction },
  viewedFrom,
  indexAt,
  numbersEveryDeg,
  stepDeg,
  quiet,
}: Omit<RingScaleProps, 'seenTurn'>) {
  const outer = radius * 0.955;
  const length = { long: 0.13, middle: 0.105, fine: 0.06 } as const;
  // At rest the offset is under the index.
  const angleOf = (dialDeg: number): number =>
    seenAngle(indexAt + direction * (offsetDeg - dialDeg), viewedFrom);
  const path = (rank: keyof typeof length): string =>
    ringTicks(stepDeg)
      .filter((tick) => tick.rank === rank)
      .map(({ dialDeg }) => radial(outer - radius * length[rank], outer, angleOf(dialDeg)))
      .join('');
  const numbers =
    numbersEveryDeg === null
      ? []
      : Array.from({ length: 360 / numbersEveryDeg }, (_, index) => index * numbersEveryDeg);
  // The numerals keep their size in the eye: never below 11 px, whatever the ring's size.
  const type = Math.min(17, Math.max(11, radius * 0.12));
  return (
    <>
      <g fill="none" className={quiet ? 'stroke-ink-3' : 'stroke-ink'}>
        <path d={path('fine')} strokeWidth={stepDeg <= 2 ? 0.6 : 0.8} />
        <path d={path('middle')} strokeWidth={radius >= 90 ? 0.9 : 1.1} />
        <path d={path('long')} strokeWidth={radius >= 40 ? 1.5 : 1.1} />
      </g>
      {numbers.map((dialDeg) => {
        const angle = angleOf(dialDeg);
        const [x, y] = polar(radius * 0.745, angle);
        return (
          <text
            key={dialDeg}
            x={x}
            y={y}
            transform={`rotate(${90 - angle} ${x} ${y})`}
            textAnchor="middle"
            dominantBaseline="central"
            fontSize={type}
            className={quiet ? 'fill-ink-3 font-mono' : 'fill-ink font-mono'}
          >
            {dialDeg}
          </text>
        );
      })}
    </>
  );
});
