import type { Convention } from '../../../shared/optics';
import { NumberField } from '../../components/NumberField';
import { TextField } from '../../components/TextField';
import type { BenchFieldOf } from './bench-form-values';
import { inputFault, InputReading } from './InputReading';

/** What light comes to the plates: its wavelength, what the polariser makes of it, and how well both are known. */
export function LightFields(props: {
  readonly field: BenchFieldOf;
  readonly inputExpression: string;
  readonly convention: Convention;
}) {
  const { field, inputExpression, convention } = props;
  const input = field('inputExpression');
  return (
    <div className="space-y-4">
      <TextField label="bench’s name" {...field('name')} required />
      <div className="grid gap-4 sm:grid-cols-2">
        <NumberField label="wavelength, nm" {...field('wavelengthNm')} required />
        <NumberField
          label="its σ, nm"
          help="0 leaves it out of the budget."
          {...field('wavelengthSigmaNm')}
          required
        />
        <NumberField
          label="temperature of the plates, °C"
          help="Empty where nobody watches it."
          {...field('temperatureC')}
        />
        <NumberField label="its σ, K" {...field('temperatureSigmaK')} required />
      </div>
      <TextField
        label="state behind the polariser"
        mono
        help={<InputReading expression={inputExpression} convention={convention} />}
        {...input}
        fault={input.fault ?? inputFault(inputExpression, convention)}
        required
      />
      <div className="grid gap-4 sm:grid-cols-2">
        <NumberField
          label="σ of the polariser’s angle, degrees"
          help="0 if it is what every angle is counted from."
          {...field('polariserSigmaDeg')}
          required
        />
        <NumberField
          label="extinction of the polariser"
          help="Power it lets through crossed over parallel, such as 1e-5. Empty where it is not stated."
          {...field('polariserExtinction')}
        />
      </div>
    </div>
  );
}
