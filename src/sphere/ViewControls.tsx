import type { FacedBasis, TurnWay, ViewCommand } from './view-keys';
import { TURN_STEP_DEG } from './view-keys';

interface Props {
  readonly onCommand: (command: ViewCommand) => void;
  readonly inWords: boolean;
  readonly onInWords: (shown: boolean) => void;
}

const FACES: readonly { readonly basis: FacedBasis; readonly text: string; readonly name: string }[] = [
  { basis: 'hv', text: 'H', name: 'Face H, again for V' },
  { basis: 'da', text: 'D', name: 'Face D, again for A' },
  { basis: 'rl', text: 'R', name: 'Face R, again for L' },
];

const WAYS: readonly TurnWay[] = ['left', 'right', 'up', 'down'];

/** What the keys do, for a pointer that can't drag. */
export function ViewControls({ onCommand, inWords, onInWords }: Props) {
  return (
    <>
      <div className="sphere-controls sphere-controls-top" role="group" aria-label="View of the sphere">
        {FACES.map(({ basis, text, name }) => (
          <button
            key={basis}
            type="button"
            aria-label={name}
            onClick={() => onCommand({ do: 'face', basis })}
          >
            {text}
          </button>
        ))}
        <button type="button" onClick={() => onCommand({ do: 'home' })}>
          home
        </button>
      </div>
      <div className="sphere-controls sphere-controls-bottom">
        <button type="button" aria-expanded={inWords} onClick={() => onInWords(!inWords)}>
          in words
        </button>
        <div role="group" aria-label="Turn the sphere">
          {WAYS.map((way) => (
            <button
              key={way}
              type="button"
              aria-label={`Turn ${way} by ${TURN_STEP_DEG}°`}
              onClick={() => onCommand({ do: 'turn', way, byDeg: TURN_STEP_DEG })}
            >
              {way}
            </button>
          ))}
        </div>
      </div>
    </>
  );
}
