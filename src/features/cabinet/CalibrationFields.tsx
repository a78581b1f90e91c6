import type { UseFormRegisterReturn } from 'react-hook-form';
import { CheckField } from '../../components/CheckField';
import { NumberField } from '../../components/NumberField';
import { TextArea } from '../../components/TextArea';
import { TextField } from '../../components/TextField';
import { GapText } from '../../lib/GapText';
import type { CalibrationDoubts } from './calibration-doubts';
import type { CalibrationTextField, QuestionField } from './calibration-form-values';
import type { FieldBinding } from './field-binding';

/** The fields of one calibration, in a form that brings its own values. */
export function CalibrationFields({
  field,
  question,
  doubts,
}: {
  readonly field: (name: CalibrationTextField) => FieldBinding;
  readonly question: (name: QuestionField) => UseFormRegisterReturn;
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
      <fieldset className="space-y-2 sm:col-span-2">
        <legend className="text-s text-ink-2 mb-1">what it could not tell</legend>
        <CheckField
          label="which axis is the fast one"
          help="The zero may be the slow axis’s, a quarter turn away. Every scan between polarisers leaves this open."
          {...question('axisOpen')}
        />
        <CheckField
          label="whether the retardance is the one above or 360° less it"
          {...question('branchOpen')}
        />
        <CheckField
          label="the retardance to first order"
          help="Near 180° between polarisers, near 90° behind circular light: there the power hardly follows it."
          {...question('blind')}
        />
      </fieldset>
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
