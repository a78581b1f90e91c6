import type { UseFormRegisterReturn } from 'react-hook-form';
import { NumberField } from '../../components/NumberField';
import { TextArea } from '../../components/TextArea';
import { TextField } from '../../components/TextField';
import { GapText } from '../../lib/GapText';
import type { CalibrationDoubts } from './calibration-doubts';
import type { CalibrationValues } from './plate-form-values';

/** A registered field with the sentence that says what is wrong with it. */
export type FieldBinding = UseFormRegisterReturn & { readonly fault: string | undefined };

/** The fields of one calibration, in a form that brings its own values. */
export function CalibrationFields({
  field,
  doubts,
}: {
  readonly field: (name: keyof CalibrationValues) => FieldBinding;
  readonly doubts: CalibrationDoubts;
}) {
  return (
    <div className="grid gap-4 sm:grid-cols-2">
      <NumberField label="wavelength, nm" {...field('wavelengthNm')} required />
      <TextField label="measured at (your time)" type="datetime-local" {...field('measuredAt')} required />
      <NumberField
        label="retardance, degrees"
        help={<Doubt text={doubts.retardance} />}
        {...field('retardanceDeg')}
        required
      />
      <NumberField
        label="its σ, degrees"
        help={<Doubt text={doubts.retardanceSigma} />}
        {...field('retardanceSigmaDeg')}
        required
      />
      <NumberField
        label="zero, degrees on the dial"
        help="What the dial reads with the fast axis along H."
        {...field('offsetDeg')}
        required
      />
      <NumberField
        label="its σ, degrees"
        help={<Doubt text={doubts.offsetSigma} />}
        {...field('offsetSigmaDeg')}
        required
      />
      <NumberField
        label="temperature of the plate, °C"
        help="Empty where nobody wrote it down."
        {...field('temperatureC')}
      />
      <TextField
        label="how it was measured"
        help="For instance: between crossed polarisers, 31 points."
        className="sm:col-span-2"
        {...field('method')}
        required
      />
      <TextArea label="note" rows={2} className="sm:col-span-2" {...field('note')} />
    </div>
  );
}

/** Under its field and tied to it, and announced when it comes; what is typed may be right. */
function Doubt({ text }: { readonly text: string | null }) {
  return (
    <span role="status" className="text-ink">
      {text !== null && <GapText text={text} />}
    </span>
  );
}
