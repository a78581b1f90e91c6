import { NumberField } from '../../components/NumberField';
import { TextField } from '../../components/TextField';
import type { BenchFieldOf } from './bench-form-values';

/** What counts, or reads power, behind each port of the analysing polariser. */
export function DetectorFields(props: {
  readonly field: BenchFieldOf;
  /** A ratio compares two: without both it is not asked for. */
  readonly hasBoth: boolean;
}) {
  const { field, hasBoth } = props;
  return (
    <fieldset className="space-y-4">
      <legend className="text-section mb-1">Detectors</legend>
      {(['passed', 'rejected'] as const).map((port) => (
        <div key={port} className="grid gap-4 sm:grid-cols-2">
          <TextField
            label={`${port} port, detector’s name`}
            help={
              port === 'passed'
                ? 'Behind the analysing polariser. Empty where nothing stands there.'
                : 'Where the polariser has a second way out with something behind it.'
            }
            autoComplete="off"
            {...field(`${port}Name`)}
          />
          <NumberField
            label={`${port} port, dark rate, per second`}
            help="Counts without light; 0 for a power meter that is zeroed."
            {...field(`${port}DarkPerS`)}
          />
        </div>
      ))}
      {hasBoth && (
        <NumberField
          label="efficiency, rejected over passed"
          className="sm:w-1/2 sm:pr-2"
          help="How many the rejected port counts for one of the passed, of equal light. Empty where nobody measured it."
          {...field('efficiencyRatio')}
        />
      )}
    </fieldset>
  );
}
