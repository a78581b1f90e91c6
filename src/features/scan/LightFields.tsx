import type { SeatedCalibration } from '../../../shared/schemas/cabinet';
import type { Bench } from '../../../shared/schemas/benches';
import { ExpressionField } from '../../components/ExpressionField';
import { NumberField } from '../../components/NumberField';
import { SegmentedChoice } from '../../components/SegmentedChoice';
import { SelectField } from '../../components/SelectField';
import { formatMoment } from '../../lib/format';
import type { ReadLight, ScanField, ScanFormValues } from './scan-form-values';

interface LightFieldsProps {
  readonly values: ScanFormValues;
  readonly read: ReadLight;
  readonly fault: (field: ScanField) => string | undefined;
  readonly onChange: (change: Partial<ScanFormValues>) => void;
  /** From which the extinction was taken, while it stands as it was taken. */
  readonly bench: Pick<Bench, 'name'> | null;
  /** Scans between polarisers of the present seat. */
  readonly earlier: readonly SeatedCalibration[];
  /** The unit of the power where one port alone was read; null where both were, or nobody knows yet. */
  readonly onePortUnit: string | null;
  readonly now: Date;
}

const kinds = [
  { value: 'linear', label: 'between polarisers' },
  { value: 'known', label: 'behind known light' },
] as const;

/** How the light went while the plate was turned. */
export function LightFields(props: LightFieldsProps) {
  const { values, fault, onChange, bench } = props;
  const number = (field: ScanField) => ({
    value: values[field],
    onChange: ({ target }: { readonly target: { readonly value: string } }) =>
      onChange({ [field]: target.value }),
    fault: fault(field),
  });
  const isLinear = values.lightKind === 'linear';
  return (
    <div className="space-y-4">
      <SegmentedChoice
        label="the plate turned"
        segments={kinds}
        value={values.lightKind}
        onChange={(lightKind) => onChange({ lightKind })}
        help={
          isLinear
            ? 'The first polariser along H; the dial read with its power behind a crossed analyser, a parallel one, or both.'
            : 'Light of a state that is known comes in, and a fixed linear analyser stands behind the plate.'
        }
      />
      {!isLinear && <KnownLight {...props} number={number} />}
      <div className="grid gap-4 sm:grid-cols-2">
        <NumberField
          label="extinction, P⊥/P∥"
          help={
            bench === null
              ? isLinear
                ? 'Without a plate. Empty where nobody measured it: then it is fitted where it can be.'
                : 'Of the analyser. Empty takes it as ideal.'
              : `As ${bench.name} states it. ${isLinear ? 'Empty it to have it fitted.' : 'Empty takes it as ideal.'}`
          }
          {...number('extinction')}
        />
        <NumberField label="its σ" help="0 takes it as exact." {...number('extinctionSigma')} />
        {isLinear && props.onePortUnit !== null && (
          <>
            <NumberField
              label={`power that enters, ${props.onePortUnit}`}
              help="Of both ports together. One port alone tells the retardance only with it."
              {...number('power')}
            />
            <NumberField label="its σ" help="0 takes it as exact." {...number('powerSigma')} />
          </>
        )}
      </div>
    </div>
  );
}

function KnownLight(
  props: LightFieldsProps & {
    readonly number: (field: ScanField) => {
      readonly value: string;
      readonly onChange: (event: { readonly target: { readonly value: string } }) => void;
      readonly fault: string | undefined;
    };
  },
) {
  const { values, read, onChange, earlier, now, number, fault } = props;
  const missing = fault('inputExpression');
  return (
    <>
      <ExpressionField
        label="state of the light that comes in"
        help={
          missing ??
          'R or L for circular light, or stokes(0.48, 0.36, 0.8) as it was measured; in the lab’s convention.'
        }
        value={values.inputExpression}
        fault={read.expressionProblem ?? undefined}
        onChange={(inputExpression) => onChange({ inputExpression })}
      />
      <div className="grid gap-4 sm:grid-cols-2">
        <NumberField
          label="analyser, degrees from H"
          help="Counter-clockwise as the receiver sees it."
          {...number('analyserDeg')}
        />
        <SelectField
          label="taken together with"
          value={values.beforeId}
          onChange={({ target }) => onChange({ beforeId: target.value })}
          options={[
            { value: '', label: 'nothing, by itself' },
            ...earlier.map(({ id, measuredAt }) => ({
              value: id,
              label: `the scan of ${formatMoment(new Date(measuredAt), now)}`,
            })),
          ]}
          help={
            earlier.length === 0
              ? 'No scan between polarisers was recorded in this seat.'
              : 'A scan between polarisers of this seat: it tells how much, this one which way.'
          }
        />
      </div>
    </>
  );
}
