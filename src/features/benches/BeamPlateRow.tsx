import type { PointerEvent } from 'react';
import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import { Button } from '../../components/Button';
import { classNames } from '../../components/class-names';
import { GapText } from '../../lib/GapText';
import { useLab } from '../labs';
import type { PlateConflict } from './bench-conflicts';
import { ConflictWords } from './ConflictWords';
import { PlateSummary } from './PlateSummary';
import { plateHealthWords } from './plate-state-words';
import { PlateSign } from './PlateSign';
import type { BeamMoves } from './use-beam-moves';

/** One plate in the beam: what it is, what speaks against it here, and the ways to move it. */
export function BeamPlateRow(props: {
  readonly placeKey: string;
  readonly name: string;
  /** Undefined until the cabinet has said what it is. */
  readonly plate: CabinetPlate | undefined;
  readonly conflicts: readonly PlateConflict[];
  /** What the server has against it, where this page could not know. */
  readonly fault: string | undefined;
  readonly now: Date;
  readonly moves: BeamMoves;
  readonly onGrip: (event: PointerEvent) => void;
  readonly wasDrag: () => boolean;
  /** How far it is held from its place; null while it isn't. */
  readonly draggedByPx: number | null;
  readonly isDropBefore: boolean;
}) {
  const { placeKey, name, plate, conflicts, fault, now, moves, onGrip, wasDrag } = props;
  const { draggedByPx, isDropBefore } = props;
  const { lab } = useLab();
  const isHeld = moves.grabbedKey === placeKey;
  const isNew = fault !== undefined && conflicts.every(({ sentence }) => sentence !== fault);
  return (
    <li
      data-place={placeKey}
      className={classNames(
        'beam-place',
        (isHeld || draggedByPx !== null) && 'beam-place-held',
        isDropBefore && 'bench-drop-before',
      )}
      style={draggedByPx === null ? undefined : { translate: `0 ${draggedByPx}px` }}
    >
      <span className="beam-place-ring">
        <PlateSign plate={plate} radius={21} now={now} />
      </span>
      <div className="beam-place-words">
        <p>
          <strong>{name}</strong>{' '}
          {plate !== undefined && (
            <span className="text-ink-2">
              <PlateSummary plate={plate} />
            </span>
          )}
        </p>
        {plate !== undefined && (
          <p className="text-s text-ink-2">
            {plateHealthWords(plate, { calibrationDueDays: lab.calibrationDueDays, now })}
          </p>
        )}
      </div>
      <div className="beam-place-hands">
        <button
          type="button"
          data-control="grip"
          className="bench-grip"
          aria-label={`${isHeld ? 'Drop' : 'Grab'} ${name}`}
          aria-describedby="bench-grip-help"
          onPointerDown={onGrip}
          onClick={() => {
            if (!wasDrag()) moves.toggle(placeKey);
          }}
          onKeyDown={moves.press(placeKey)}
          onBlur={moves.leave(placeKey)}
        >
          <Knurl />
          {isHeld ? 'Drop' : 'Grab'}
        </button>
        <Button data-control="up" aria-label={`Move ${name} up`} onClick={() => moves.up(placeKey)}>
          Up
        </Button>
        <Button data-control="down" aria-label={`Move ${name} down`} onClick={() => moves.down(placeKey)}>
          Down
        </Button>
        <Button aria-label={`Take out ${name}`} onClick={() => moves.remove(placeKey)}>
          Take out
        </Button>
      </div>
      <div className="beam-place-conflicts" aria-live="polite">
        {isNew && <ConflictWords kind="fault">{fault}</ConflictWords>}
        {conflicts.map(({ kind, sentence }) => (
          <ConflictWords key={sentence} kind={kind}>
            <GapText text={sentence} />
          </ConflictWords>
        ))}
      </div>
    </li>
  );
}

/** The knurled rim of a mount: what a finger takes hold of. */
function Knurl() {
  return (
    <svg aria-hidden="true" viewBox="-9 -6 18 12" width="18" height="12">
      <path d="M-8 -5V5M-4 -5V5M0 -5V5M4 -5V5M8 -5V5" className="stroke-ink" strokeWidth="1.6" />
    </svg>
  );
}
