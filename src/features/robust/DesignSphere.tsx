import { useMemo, useState } from 'react';
import { type Convention, NAMED_STATES, type NamedState } from '../../../shared/optics';
import { NumberField } from '../../components/NumberField';
import { Scientific } from '../../components/Scientific';
import { SelectField } from '../../components/SelectField';
import { TextButton } from '../../components/TextLink';
import { typedFromNumber, readTypedNumber } from '../../lib/forms';
import { createSphereViewStore, Sphere } from '../../sphere';
import type { Design } from './design';
import { designSphere } from './design-sphere';

interface DesignSphereProps {
  readonly design: Design;
  readonly convention: Convention;
  readonly error: number;
  readonly infidelity: number;
  readonly onLookAt: (error: number) => void;
}

/** The path of the light through the composite, at no error and at any other. */
export function DesignSphere({ design, convention, error, infidelity, onLookAt }: DesignSphereProps) {
  const [view] = useState(() => createSphereViewStore());
  const [followed, follow] = useState<NamedState>('H');
  const input = useMemo(
    () => designSphere(design, error, followed, convention),
    [design, error, followed, convention],
  );
  const unit = design.error === 'retardance' ? 100 : 1;
  const shown = Number((error * unit).toPrecision(4));
  const reach = 2 * design.width * unit;
  return (
    <div className="min-w-0">
      <div className="mb-3 flex flex-wrap items-end gap-x-4 gap-y-2">
        {design.goal.kind === 'apply' && (
          <SelectField
            label="follow"
            className="w-20"
            value={followed}
            options={NAMED_STATES.map((value) => ({ value, label: value }))}
            onChange={({ target }) => {
              const light = NAMED_STATES.find((name) => name === target.value);
              if (light !== undefined) follow(light);
            }}
          />
        )}
        <ErrorField
          shown={shown}
          reach={reach}
          label={design.error}
          onTake={(value) => onLookAt(value / unit)}
        />
        <input
          type="range"
          className="robust-slide h-10 min-w-24 flex-1"
          aria-label={
            design.error === 'retardance' ? 'error on the sphere, per cent' : 'error on the sphere, nm'
          }
          min={-reach}
          max={reach}
          step={reach / 100}
          value={shown}
          onChange={({ target }) => onLookAt(Number(target.value) / unit)}
        />
        <TextButton className={shown === 0 ? 'invisible mb-2' : 'mb-2'} onClick={() => onLookAt(0)}>
          No error
        </TextButton>
      </div>
      <Sphere input={input} view={view} />
      <p className="mt-2 text-s text-ink-2">
        {shown === 0 ? 'With no error' : 'With this error'} the setting has 1 − F{' '}
        {infidelity <= 1e-20 ? '0' : <Scientific value={infidelity} mono={false} />}.
      </p>
    </div>
  );
}

interface ErrorFieldProps {
  /** In the unit of the field. */
  readonly shown: number;
  /** No error beyond this either way. */
  readonly reach: number;
  readonly label: Design['error'];
  readonly onTake: (shown: number) => void;
}

/** The error as a number: it counts when it is left or Enter is pressed. */
function ErrorField({ shown, reach, label, onTake }: ErrorFieldProps) {
  const [typed, setTyped] = useState(() => typedFromNumber(shown));
  const [seen, setSeen] = useState(shown);
  if (seen !== shown) {
    setSeen(shown);
    setTyped(typedFromNumber(shown));
  }
  const value = readTypedNumber(typed);
  const take = () => {
    if (!Number.isFinite(value)) return;
    const taken = Math.max(-reach, Math.min(reach, value));
    setTyped(typedFromNumber(taken));
    if (taken !== shown) onTake(taken);
  };
  return (
    <NumberField
      label={label === 'retardance' ? 'at an error of, %' : 'at an error of, nm'}
      className="w-28"
      value={typed}
      fault={Number.isFinite(value) ? undefined : 'Write a number.'}
      onChange={(event) => setTyped(event.target.value)}
      onBlur={take}
      onKeyDown={(event) => {
        if (event.key === 'Enter') take();
      }}
    />
  );
}
