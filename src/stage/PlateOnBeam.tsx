import type { ReactNode } from 'react';
import { RingDial } from '../components/RingDial';
import { RingDialControl } from '../components/RingDialControl';
import { formatDial, formatTheta, formatUncertain } from '../lib/format';
import { type StagePlate, turnedByHand } from './stage-data';
import type { StageSizes } from './stage-layout';

interface Props {
  readonly plate: StagePlate;
  readonly sizes: StageSizes;
  readonly viewedFrom: 'receiver' | 'source';
  readonly before: ReactNode;
  readonly onDial: ((dialDeg: number) => void) | undefined;
}

/** One mount in the beam, the light before it, and under it: name, retardance, θ small and dial large. */
export function PlateOnBeam({ plate, sizes, viewedFrom, before, onDial }: Props) {
  const { name, kind, scale, dialDeg, fastAxisDeg } = plate;
  const ring = { radius: sizes.ringRadius, kind, readingDeg: dialDeg, viewedFrom };
  const byHand = turnedByHand([plate]).length > 0;
  return (
    <>
      <li className="stage-item stage-item-between">{before}</li>
      <li className="stage-item" style={{ minWidth: 2 * sizes.ringRadius }}>
        <span className="stage-zone" style={{ height: sizes.zoneHeight }}>
          <span
            className={onDial === undefined ? 'stage-ring' : 'stage-ring stage-ring-turnable'}
            style={{ width: 2 * sizes.ringRadius, height: 2 * sizes.ringRadius }}
          >
            {onDial === undefined ? (
              <RingDial {...ring} scale={scale} />
            ) : (
              <RingDialControl {...ring} name={name} scale={scale} onChange={onDial} />
            )}
          </span>
        </span>
        <span className="stage-name">
          <strong>{name}</strong>{' '}
          <span className="stage-retardance font-mono">
            {formatUncertain(plate.retardanceDeg, plate.retardanceSigmaDeg, 1)}°
          </span>
        </span>
        <span className="stage-dial-line">
          <span className="stage-theta font-mono">
            <span className="stage-symbol">θ</span> {formatTheta(fastAxisDeg)}°
          </span>{' '}
          <strong className="stage-dial font-mono">
            <span className="sr-only">dial </span>
            {formatDial(dialDeg, scale.resolutionDeg)}
          </strong>
        </span>
        {byHand && plate.solutionDialDeg !== undefined && (
          <span className="stage-second">
            solution{' '}
            <span className="font-mono">{formatDial(plate.solutionDialDeg, scale.resolutionDeg)}</span>
          </span>
        )}
        {viewedFrom === 'source' && <span className="stage-second">as seen from the source</span>}
      </li>
    </>
  );
}
