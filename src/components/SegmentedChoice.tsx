import { type ReactNode, useId } from 'react';
import { classNames } from './class-names';

interface Segment<Value extends string> {
  readonly value: Value;
  readonly label: ReactNode;
}

interface SegmentedChoiceProps<Value extends string> {
  /** What is chosen between; read out before the choices. */
  readonly label: ReactNode;
  readonly hideLabel?: boolean;
  readonly segments: readonly Segment<Value>[];
  readonly value: Value;
  readonly onChange: (value: Value) => void;
  readonly help?: ReactNode;
  readonly disabled?: boolean;
  readonly className?: string | undefined;
}

const face = {
  chosen:
    'cursor-pointer bg-ink font-strong text-paper dark-room:bg-transparent dark-room:text-act dark-room:outline-2 dark-room:-outline-offset-2 dark-room:outline-act',
  other: 'cursor-pointer text-ink hover:bg-wash',
} as const;
/** Where it can't be changed. */
const fixedFace = { chosen: 'bg-wash font-strong text-ink', other: 'text-ink-2' } as const;

/** A choice of two or three as joined cells, the chosen one filled. Radio buttons underneath, so the arrow keys work. */
export function SegmentedChoice<Value extends string>({
  label,
  hideLabel = false,
  segments,
  value,
  onChange,
  help,
  disabled = false,
  className,
}: SegmentedChoiceProps<Value>) {
  const name = useId();
  const helpId = `${name}-help`;
  return (
    <fieldset
      className={className}
      disabled={disabled}
      aria-describedby={help === undefined ? undefined : helpId}
    >
      <legend className={hideLabel ? 'sr-only' : 'text-s text-ink-2'}>{label}</legend>
      <div
        className={classNames(
          'inline-flex border',
          disabled ? 'border-rule' : 'border-ink',
          !hideLabel && 'mt-1',
        )}
      >
        {segments.map((segment, index) => (
          <label
            key={segment.value}
            className={classNames(
              'relative flex min-h-9.5 items-center justify-center px-4 text-center max-sm:min-h-11',
              index > 0 && (disabled ? 'border-l border-rule' : 'border-l border-ink'),
              (disabled ? fixedFace : face)[segment.value === value ? 'chosen' : 'other'],
              'has-focus-visible:z-10 has-focus-visible:outline-3 has-focus-visible:outline-offset-2 has-focus-visible:outline-beam',
            )}
          >
            <input
              type="radio"
              className="absolute inset-0 m-0 cursor-[inherit] appearance-none outline-none"
              name={name}
              value={segment.value}
              checked={segment.value === value}
              onChange={() => {
                onChange(segment.value);
              }}
            />
            {/* Positioned, so that it lies over the input and stays plain text on its ground. */}
            <span className="pointer-events-none relative">{segment.label}</span>
          </label>
        ))}
      </div>
      {help !== undefined && (
        <p id={helpId} className="mt-1 text-s text-ink-2">
          {help}
        </p>
      )}
    </fieldset>
  );
}
