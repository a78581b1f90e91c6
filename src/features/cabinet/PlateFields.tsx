import { NumberField } from '../../components/NumberField';
import { SelectField } from '../../components/SelectField';
import { TextArea } from '../../components/TextArea';
import { TextField } from '../../components/TextField';
import type { FieldBinding } from './field-binding';
import type { PlateValues } from './plate-form-values';
import { constructionNames, materialNames } from './plate-words';

const kindOptions = [
  { value: 'half', label: 'half-wave' },
  { value: 'quarter', label: 'quarter-wave' },
  { value: 'other', label: 'other' },
];

const options = (names: Readonly<Record<string, string>>) =>
  Object.entries(names).map(([value, label]) => ({ value, label }));

/** What a plate is, in a form that brings its own values. */
export function PlateFields(props: {
  readonly field: (name: keyof PlateValues) => FieldBinding;
  /** Whether it is built so that it has whole waves. */
  readonly isMultiOrder: boolean;
}) {
  const { field, isMultiOrder } = props;
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
      <TextField label="serial number" mono {...field('serial')} />
      <NumberField
        label="clear aperture, mm"
        help="The diameter that light may pass. Empty where nobody knows it."
        {...field('clearApertureMm')}
      />
      <div className="grid gap-4 sm:col-span-2 sm:grid-cols-2">
        <NumberField
          label="coated from, nm"
          help="Empty where nobody knows its coating."
          {...field('coatingFromNm')}
        />
        <NumberField label="coated to, nm" {...field('coatingToNm')} />
      </div>
      <TextArea
        label="damage"
        help="What its maker says that it stands, or a burn that was seen."
        rows={2}
        className="sm:col-span-2"
        {...field('damageNote')}
      />
      <TextArea label="note" rows={2} className="sm:col-span-2" {...field('note')} />
    </div>
  );
}
