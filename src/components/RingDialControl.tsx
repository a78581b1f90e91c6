import { type KeyboardEvent, type PointerEvent, useId, useRef, useState } from 'react';
import { type DialScale, fastAxisFromDial, roundDial } from '../../shared/optics/dial';
import { degrees, wrapSigned } from '../../shared/optics/units';
import { formatDial } from '../lib/format/angle';
import { commaSentence, parseTypedNumber } from '../lib/format/parse-number';
import { Button } from './Button';
import { dialName } from './dial-words';
import { NumberField } from './NumberField';
import { type PlateKind, RingDial, type RingDialProps } from './RingDial';

interface RingDialControlProps extends Omit<RingDialProps, 'scale' | 'label' | 'toDeg'> {
  readonly name: string;
  readonly kind: PlateKind;
  readonly scale: DialScale;
  readonly onChange: (readingDeg: number) => void;
}

/** How far a key turns the dial, in degrees; null for a key that doesn't. */
function keyStep(key: string, shift: boolean): number | null {
  switch (key) {
    case 'ArrowUp':
    case 'ArrowRight':
      return shift ? 1 : 0.1;
    case 'ArrowDown':
    case 'ArrowLeft':
      return shift ? -1 : -0.1;
    case 'PageUp':
      return 10;
    case 'PageDown':
      return -10;
    default:
      return null;
  }
}

/** What is wrong with a reading as it is typed: short, for it stands under a narrow field. */
function faultOf(typed: string, readingDeg: number, resolutionDeg: number): string | undefined {
  const parsed = parseTypedNumber(typed);
  if (!parsed.ok) {
    return parsed.fault === 'comma'
      ? commaSentence(typed)
      : `Write a number, like ${formatDial(readingDeg, resolutionDeg)}.`;
  }
  if (parsed.value >= 0 && parsed.value < 360) return undefined;
  return `Write a number from 0 to ${formatDial(360 - resolutionDeg, resolutionDeg)}.`;
}

/** The field's label, box and fault as cells of the grid that the two buttons stand in. */
const fieldCells =
  'contents [&>label]:col-start-2 [&>label]:row-start-1 [&>input]:col-start-2 [&>input]:row-start-2 ' +
  '[&>p]:col-span-3 [&>p]:col-start-1 [&>p]:row-start-3 [&>p]:w-0 [&>p]:min-w-full [&>p]:whitespace-normal';

/** A ring that can be turned: by hand, by the arrow keys, by − and + buttons, or by writing the number. */
export function RingDialControl({ name, scale, readingDeg, onChange, ...ring }: RingDialControlProps) {
  const [typed, setTyped] = useState<string | null>(null);
  const grip = useRef<{ readonly pointerDeg: number; readonly readingDeg: number } | null>(null);
  const fieldId = useId();
  const resolution = scale.resolutionDeg;
  const turnTo = (next: number): void => {
    onChange(roundDial(degrees(next), resolution));
  };
  // A step below what the dial can be set to would be rounded away and the key would seem dead.
  const turnBy = (step: number): void => {
    turnTo(readingDeg + Math.sign(step) * Math.max(Math.abs(step), resolution));
  };

  const pointerAngle = (event: PointerEvent<HTMLDivElement>): number => {
    const box = event.currentTarget.getBoundingClientRect();
    return (
      (Math.atan2(box.top + box.height / 2 - event.clientY, event.clientX - box.left - box.width / 2) * 180) /
      Math.PI
    );
  };
  const drag = (event: PointerEvent<HTMLDivElement>): void => {
    if (grip.current === null) return;
    const seen = wrapSigned(pointerAngle(event) - grip.current.pointerDeg, 360);
    const turn = ring.viewedFrom === 'source' ? -seen : seen;
    turnTo(grip.current.readingDeg + scale.direction * turn);
  };
  const press = (event: KeyboardEvent<HTMLDivElement>): void => {
    const step = keyStep(event.key, event.shiftKey);
    if (step === null || event.ctrlKey || event.metaKey || event.altKey) return;
    event.preventDefault();
    turnBy(step);
  };
  const write = (text: string): void => {
    setTyped(text);
    const number = parseTypedNumber(text);
    if (number.ok && number.value >= 0 && number.value < 360) turnTo(number.value);
  };
  const fastAxis = fastAxisFromDial(degrees(readingDeg), scale);
  return (
    <div className="inline-flex flex-col items-center gap-2">
      <div
        role="slider"
        tabIndex={0}
        aria-label={dialName(name, readingDeg, fastAxis, resolution)}
        aria-valuemin={0}
        aria-valuemax={360}
        aria-valuenow={readingDeg}
        aria-valuetext={`${formatDial(readingDeg, resolution)} degrees`}
        className="cursor-grab touch-none active:cursor-grabbing"
        onKeyDown={press}
        onPointerDown={(event) => {
          event.currentTarget.setPointerCapture(event.pointerId);
          grip.current = { pointerDeg: pointerAngle(event), readingDeg };
        }}
        onPointerMove={drag}
        onPointerUp={() => {
          grip.current = null;
        }}
        onPointerCancel={() => {
          grip.current = null;
        }}
      >
        <RingDial {...ring} scale={scale} readingDeg={readingDeg} />
      </div>
      {/* The fault has a row of its own under all three, as wide as they are, so that it wraps and moves none of them. */}
      <div className="grid grid-cols-[auto_8rem_auto] items-end gap-x-2">
        <Button
          aria-label={`${name} dial ${formatDial(resolution, resolution)}° less`}
          className="col-start-1 row-start-2"
          onClick={() => {
            turnBy(-resolution);
          }}
        >
          <StepSign />
        </Button>
        <NumberField
          id={fieldId}
          label={`${name} dial, degrees`}
          className={fieldCells}
          value={typed ?? formatDial(readingDeg, resolution)}
          fault={typed === null ? undefined : faultOf(typed, readingDeg, resolution)}
          onChange={(event) => {
            write(event.currentTarget.value);
          }}
          onBlur={() => {
            setTyped(null);
          }}
        />
        <Button
          aria-label={`${name} dial ${formatDial(resolution, resolution)}° more`}
          className="col-start-3 row-start-2"
          onClick={() => {
            turnBy(resolution);
          }}
        >
          <StepSign more />
        </Button>
      </div>
    </div>
  );
}

/** Drawn like the other signs: the words are the button's name. */
function StepSign({ more = false }: { readonly more?: boolean }) {
  return (
    <svg aria-hidden="true" viewBox="-6 -6 12 12" width="12" height="12">
      <path d={more ? 'M-5 0H5M0 -5V5' : 'M-5 0H5'} className="stroke-ink" strokeWidth="1.6" />
    </svg>
  );
}
