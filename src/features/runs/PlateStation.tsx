import type { CSSProperties } from 'react';
import type { FrozenPlate } from '../../../shared/schemas/versions';
import type { ViewedFrom } from '../../components/dial-words';
import { RingDial } from '../../components/RingDial';
import type { PlateStep } from './bench-steps';
import { dialText, moveWords, placeWords } from './move-words';
import { TurnSign } from './TurnSign';
import { type BenchShape, ringRadius } from './use-bench-shape';

interface PlateStationProps {
  readonly plate: FrozenPlate;
  readonly step: PlateStep;
  readonly side: ViewedFrom;
  readonly shape: BenchShape;
  /** How many share the beam: the more, the smaller each is drawn. */
  readonly plateCount: number;
}

/** One plate on the beam: its mount, its name, the number it is about, and what to do with it. */
export function PlateStation({ plate, step, side, shape, plateCount }: PlateStationProps) {
  const { resolutionDeg } = plate.mount;
  const isNow = step.state === 'now';
  const shown = dialText(
    step.state === 'waits' || isNow ? step.wantedDeg : (step.standsDeg ?? step.wantedDeg),
    resolutionDeg,
  );
  const place = placeWords(step.plateIndex);
  const scale = { offsetDeg: plate.calibration.offsetDeg, direction: plate.mount.direction };
  const style: CSSProperties & Record<'--characters', number> = { '--characters': shown.length };
  const drawn =
    step.state === 'dialled'
      ? 'dialled'
      : step.state === 'stays' || step.state === 'waits'
        ? 'stays'
        : step.move === null
          ? 'standing'
          : 'to-turn';
  const radius = ringRadius(shape, plateCount, isNow);
  // Where nobody has said how it stands, the ring is drawn as it looks when it is right.
  const readingDeg = step.standsDeg ?? step.wantedDeg;
  return (
    <li
      className="bench-plate"
      data-state={step.state}
      aria-current={isNow ? 'step' : undefined}
      style={style}
    >
      <div className="bench-ring">
        <RingDial
          radius={radius}
          kind={plate.kind}
          scale={scale}
          readingDeg={readingDeg}
          toDeg={drawn === 'to-turn' ? step.wantedDeg : undefined}
          state={drawn}
          viewedFrom={side}
        />
      </div>
      <p className="bench-name">
        {plate.name}
        {(isNow || side === 'source') && (
          <span className="bench-place">
            {[isNow ? place : null, side === 'source' ? 'seen from the source side' : null]
              .filter((part) => part !== null)
              .join(', ')}
          </span>
        )}
      </p>
      <p className="bench-dial font-mono">{shown}</p>
      <div className="bench-said">
        <Said {...{ plate, step }} shown={shown} />
      </div>
    </li>
  );
}

function Said({
  plate,
  step,
  shown,
}: Pick<PlateStationProps, 'plate' | 'step'> & { readonly shown: string }) {
  if (step.state === 'dialled') return <>dialled {shown}</>;
  if (step.state === 'stays') return <>stays</>;
  const words = moveWords(step, plate.mount);
  if (step.state === 'waits')
    return words === null ? <>then this one</> : <>then this one, from {words.from}</>;
  if (words === null || step.move === null)
    return <p>nobody has said how it stands: turn it until it says {shown}</p>;
  return (
    <>
      <TurnSign sense={words.sense} />
      <p>
        from {words.from} {words.sense}{' '}
        <span className="whitespace-nowrap">
          by <b className="font-mono">{words.amount}°</b>,
        </span>{' '}
        <span className="whitespace-nowrap">{words.numbers}</span>
      </p>
    </>
  );
}
