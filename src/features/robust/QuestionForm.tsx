import type { SyntheticEvent } from 'react';
import type { Bench } from '../../../shared/schemas/benches';
import { usedRetardance } from '../../../shared/protocol/solving-plates';
import { Button } from '../../components/Button';
import { ExpressionField } from '../../components/ExpressionField';
import { NumberField } from '../../components/NumberField';
import { SegmentedChoice } from '../../components/SegmentedChoice';
import { SelectField } from '../../components/SelectField';
import { TextField } from '../../components/TextField';
import { benchLabel, waitsForPlates } from '../benches';
import type { RobustForm } from './robust-form';
import type { QuestionFaults } from './robust-question';

interface QuestionFormProps {
  readonly form: RobustForm;
  readonly benches: readonly Bench[];
  readonly faults: QuestionFaults;
  readonly working: boolean;
  readonly onChange: (part: Partial<RobustForm>) => void;
  readonly onSearch: () => void;
  readonly onCancel: () => void;
}

const typedPlates = 'typed';

const targetHelp = {
  prepare: 'The state behind the plates, in this lab’s convention: |R>, (H + i V)/sqrt(2), bloch(…).',
  apply: 'What the plates are to do to every state: X, hadamard, rotate(x, 90deg), hwp(30deg).',
} as const;

/** What is asked: what the plates are to make, which plates, and against which error. */
export function QuestionForm(props: QuestionFormProps) {
  const { form, benches, faults, working, onChange, onSearch, onCancel } = props;
  const bench = benches.find(({ id }) => id === form.benchId);
  const heldUp = Object.keys(faults).length > 0;
  const submit = (event: SyntheticEvent) => {
    event.preventDefault();
    if (!heldUp && !working) onSearch();
  };
  return (
    <form onSubmit={submit} aria-label="What is asked" className="mt-5">
      <div className="grid grid-cols-1 gap-x-10 gap-y-6 md:grid-cols-2 desk:grid-cols-3">
        <div className="space-y-3">
          <SegmentedChoice
            label="the plates are to"
            value={form.kind}
            onChange={(kind) => onChange({ kind })}
            segments={[
              { value: 'apply', label: 'be a unitary' },
              { value: 'prepare', label: 'make a state' },
            ]}
          />
          <ExpressionField
            label={form.kind === 'apply' ? 'unitary' : 'state'}
            help={targetHelp[form.kind]}
            value={form.targets[form.kind]}
            fault={faults.target}
            onChange={(text) => onChange({ targets: { ...form.targets, [form.kind]: text } })}
          />
        </div>
        <div className="space-y-3">
          <SelectField
            label="with the plates of"
            value={form.benchId ?? typedPlates}
            fault={faults.bench}
            help={bench === undefined || waitsForPlates(bench) ? undefined : benchHelp(bench, form)}
            onChange={({ target }) =>
              onChange({ benchId: target.value === typedPlates ? null : target.value })
            }
            options={[
              { value: typedPlates, label: 'no bench: by retardance' },
              ...benches.map((one) => ({ value: one.id, label: benchLabel(one) })),
              ...(form.benchId !== null && bench === undefined
                ? [{ value: form.benchId, label: 'a bench that is not there' }]
                : []),
            ]}
          />
          {form.benchId === null && (
            <TextField
              label="retardances in beam order, degrees"
              mono
              autoComplete="off"
              maxLength={200}
              value={form.plates}
              help="Two to six, apart by gaps: 90 180 90."
              fault={faults.plates}
              onChange={(event) => onChange({ plates: event.target.value })}
            />
          )}
          {form.benchId === null && form.kind === 'prepare' && (
            <ExpressionField
              label="light before the plates"
              value={form.input}
              fault={faults.input}
              onChange={(input) => onChange({ input })}
            />
          )}
        </div>
        <div className="space-y-3 md:max-desk:col-span-2">
          <SegmentedChoice
            label="against an error of"
            value={form.error}
            onChange={(error) => onChange({ error })}
            segments={[
              { value: 'retardance', label: 'every retardance' },
              { value: 'wavelength', label: 'the wavelength' },
            ]}
          />
          {faults.error !== undefined && (
            <p role="alert" className="text-s font-strong text-fault">
              {faults.error}
            </p>
          )}
          <NumberField
            label={form.error === 'retardance' ? 'over ±, per cent' : 'over ±, nm'}
            className="max-w-80"
            value={form.widths[form.error]}
            fault={faults.width}
            help={
              form.error === 'retardance'
                ? 'Each δ becomes δ(1 + ε), with one ε for all of them.'
                : 'Each plate as its material says, in a straight line from the bench’s wavelength.'
            }
            onChange={(event) => onChange({ widths: { ...form.widths, [form.error]: event.target.value } })}
          />
        </div>
      </div>
      <div className="mt-5 flex flex-wrap items-start gap-x-8 gap-y-3">
        {working ? (
          <Button onClick={onCancel}>Cancel the search</Button>
        ) : (
          <Button kind="filled" type="submit" waitsFor={heldUp ? 'every field to be read' : undefined}>
            Search for settings
          </Button>
        )}
        <details
          className="robust-search"
          open={faults.starts !== undefined || faults.seed !== undefined || undefined}
        >
          <summary>How it searches</summary>
          <div className="mt-2 flex flex-wrap gap-x-6 gap-y-3">
            <NumberField
              label="starts"
              className="w-28"
              value={form.starts}
              fault={faults.starts}
              onChange={(event) => onChange({ starts: event.target.value })}
            />
            <NumberField
              label="seed"
              className="w-28"
              value={form.seed}
              fault={faults.seed}
              onChange={(event) => onChange({ seed: event.target.value })}
            />
            <p className="max-w-88 self-center text-s text-ink-2">
              Each start is a set of angles drawn from the seed, improved until nothing gets better. More
              starts may find more; nothing says that a list is complete.
            </p>
          </div>
        </details>
      </div>
    </form>
  );
}

function benchHelp(bench: Bench, { kind }: RobustForm): string {
  const plates = bench.plates
    .map((plate) => `${plate.name} ${usedRetardance(plate, bench).retardanceDeg.toFixed(2)}°`)
    .join(', ');
  return `${plates}, as calibrated, at ${bench.wavelengthNm} nm${kind === 'prepare' ? `; light from ${bench.inputExpression}` : ''}.`;
}
