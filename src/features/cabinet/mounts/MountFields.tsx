import { NumberField } from '../../../components/NumberField';
import { SegmentedChoice } from '../../../components/SegmentedChoice';
import { SelectField } from '../../../components/SelectField';
import { TextArea } from '../../../components/TextArea';
import { TextField } from '../../../components/TextField';
import type { FieldBinding } from '../field-binding';
import type { MountTextField, MountValues } from './mount-form-values';
import { approachNames } from './mount-words';

const drives = [
  { value: 'hand', label: 'by hand' },
  { value: 'motor', label: 'by a motor' },
] as const;

const directions = [
  { value: '1', label: 'counter-clockwise' },
  { value: '-1', label: 'clockwise' },
] as const;

const approaches = Object.entries(approachNames).map(([value, label]) => ({ value, label }));

/** Everything of a mount, in a form that brings its own values. */
export function MountFields(props: {
  readonly field: (name: MountTextField) => FieldBinding;
  readonly drive: MountValues['drive'];
  readonly onDrive: (drive: MountValues['drive']) => void;
  readonly direction: MountValues['direction'];
  readonly onDirection: (direction: MountValues['direction']) => void;
}) {
  const { field, drive, onDrive, direction, onDirection } = props;
  const motor = drive === 'motor';
  return (
    <div className="grid items-start gap-4 sm:grid-cols-2">
      <TextField label="mount’s name" help="As it is written on it: M05." {...field('name')} required />
      <SegmentedChoice label="it is turned" segments={drives} value={drive} onChange={onDrive} />
      <NumberField
        label={motor ? 'finest step of the motor, degrees' : 'finest step of its engraving, degrees'}
        help={motor ? 'Dials are written to this step.' : '0.1 if you read it to a tenth of a degree.'}
        {...field('resolutionDeg')}
        required
      />
      <NumberField
        label="repeats within (σ), degrees"
        help="How well the same reading comes back."
        {...field('repeatabilityDeg')}
        required
      />
      <SegmentedChoice
        label="as the receiver sees it, the numbers rise when the mount is turned"
        segments={directions}
        value={direction}
        onChange={onDirection}
        className="sm:col-span-2"
      />
      <NumberField
        label="first reading it reaches, degrees"
        help="Empty for a ring that turns all the way round."
        {...field('rangeFromDeg')}
      />
      <NumberField label="last reading it reaches, degrees" {...field('rangeToDeg')} />
      {motor && (
        <NumberField
          label="speed, degrees a second"
          help="Empty where nobody knows it. Least travel counts with it."
          {...field('speedDegPerS')}
        />
      )}
      <NumberField label="backlash, degrees" {...field('backlashDeg')} required />
      <SelectField
        label="a reading is approached"
        options={approaches}
        help="Always from the same side, backlash does not show."
        {...field('approach')}
      />
      <TextArea label="note" rows={2} className="sm:col-span-2" {...field('note')} />
    </div>
  );
}
