import { NumberField } from '../../components/NumberField';
import { SegmentedChoice } from '../../components/SegmentedChoice';
import { SelectField } from '../../components/SelectField';
import { TextArea } from '../../components/TextArea';
import { TextField } from '../../components/TextField';
import type { FieldBinding } from './CalibrationFields';
import type { PlateValues } from './plate-form-values';
import { approachNames, constructionNames, materialNames } from './plate-words';

export type PlateFieldName =
  Exclude<keyof PlateValues, 'mount'> | `mount.${Exclude<keyof PlateValues['mount'], 'direction'>}`;

const kindOptions = [
  { value: 'half', label: 'half-wave' },
  { value: 'quarter', label: 'quarter-wave' },
  { value: 'other', label: 'other' },
];

const options = (names: Readonly<Record<string, string>>) =>
  Object.entries(names).map(([value, label]) => ({ value, label }));

const directions = [
  { value: '1', label: 'counter-clockwise' },
  { value: '-1', label: 'clockwise' },
] as const;

/** A plate and the mount it sits in, in a form that brings its own values. */
export function PlateFields(props: {
  readonly field: (name: PlateFieldName) => FieldBinding;
  /** Whether it is built so that it has whole waves. */
  readonly isMultiOrder: boolean;
  readonly direction: PlateValues['mount']['direction'];
  readonly onDirection: (direction: PlateValues['mount']['direction']) => void;
}) {
  const { field, isMultiOrder, direction, onDirection } = props;
  return (
    <div className="grid gap-4 sm:grid-cols-2">
      <TextField label="plate’s name" help="As it is written on it: H-3, Q-B." {...field('name')} required />
      <SelectField label="kind" options={kindOptions} {...field('kind')} />
      <NumberField label="made for, nm" {...field('designWavelengthNm')} required />
      <SelectField
        label="built as"
        help="Decides how it follows the wavelength."
        options={options(constructionNames)}
        {...field('construction')}
      />
      <SelectField label="material" options={options(materialNames)} {...field('material')} />
      {isMultiOrder && (
        <NumberField
          label="whole waves beyond its retardance"
          help="The order that its maker states, at the wavelength it was made for."
          {...field('order')}
          required
        />
      )}
      <TextField label="mount’s name" {...field('mount.name')} required />
      <NumberField
        label="finest step of its dial, degrees"
        help="0.1 if you read it to a tenth of a degree."
        {...field('mount.resolutionDeg')}
        required
      />
      <NumberField
        label="repeats within (σ), degrees"
        help="How well the same reading comes back."
        {...field('mount.repeatabilityDeg')}
        required
      />
      <SegmentedChoice
        label="as the receiver sees it, the engraved numbers rise when the mount is turned"
        segments={directions}
        value={direction}
        onChange={onDirection}
        className="sm:col-span-2"
      />
      <NumberField
        label="first reading it reaches, degrees"
        help="Empty for a ring that turns all the way round."
        {...field('mount.rangeFromDeg')}
      />
      <NumberField label="last reading it reaches, degrees" {...field('mount.rangeToDeg')} />
      <NumberField
        label="speed, degrees a second"
        help="Empty for a mount turned by hand."
        {...field('mount.speedDegPerS')}
      />
      <NumberField label="backlash, degrees" {...field('mount.backlashDeg')} required />
      <SelectField
        label="a reading is approached"
        options={options(approachNames)}
        {...field('mount.approach')}
      />
      <TextArea label="note" rows={2} className="sm:col-span-2" {...field('note')} />
    </div>
  );
}
