import { unitLabel } from '../../../shared/scan-file';
import { NumberField } from '../../components/NumberField';
import { SectionHead } from '../../components/SectionHead';
import { TextArea } from '../../components/TextArea';
import { TextButton } from '../../components/TextLink';
import { LeaveUnsaved } from '../../components/LeaveUnsaved';
import { TextField } from '../../components/TextField';
import { FilePreview } from './FilePreview';
import { LightFields } from './LightFields';
import { ScanFilePart } from './ScanFilePart';
import { ScanOutcome } from './ScanOutcome';
import type { ScanField } from './scan-form-values';
import { type NewScanProps, type NewScanState, useNewScan } from './use-new-scan';

/** A scan on its way to a calibration: the file and how the light went on the left, what comes of it on the right. */
export function NewScan(props: NewScanProps) {
  const { plate, now } = props;
  const state = useNewScan(props);
  const { table } = state;
  const onePort = table !== null && (table.mapping.crossed === null || table.mapping.parallel === null);
  return (
    <div className="grid grid-cols-1 gap-x-12 gap-y-8 lg:grid-cols-[minmax(0,27rem)_minmax(0,1fr)] xl:grid-cols-[minmax(0,34rem)_minmax(0,1fr)]">
      <div className="space-y-7">
        <section aria-label="The file">
          <SectionHead className="mb-3">The file</SectionHead>
          <ScanFilePart
            chosen={state.file?.file.name ?? null}
            fault={state.scanFile.fault}
            sending={state.scanFile.sending}
            onCancel={state.scanFile.cancel}
            onFile={(file) => void state.take(file)}
          />
          <Columns state={state} />
        </section>
        <section aria-label="How the light went">
          <SectionHead className="mb-3">How the light went</SectionHead>
          <LightFields
            values={state.values}
            read={state.light}
            fault={state.faultOf}
            onChange={state.change}
            bench={state.bench}
            earlier={state.earlier}
            onePortUnit={table !== null && onePort ? unitLabel(table.powerUnit) : null}
            now={now}
          />
        </section>
        <section aria-label="When and at what">
          <SectionHead className="mb-3">When and at what</SectionHead>
          <Surroundings state={state} />
        </section>
      </div>
      <section aria-label={`What the scan tells of ${plate.name}`}>
        <SectionHead className="mb-3">What it tells of {plate.name}</SectionHead>
        <ScanOutcome state={state} plate={plate} />
      </section>
      <LeaveUnsaved
        isUnsaved={state.file !== null}
        isDoneRef={state.isDone}
        question="Leave the scan unrecorded?"
        stay="Stay with the scan"
        leave="Leave it unrecorded"
      >
        <p>
          The file, the columns and the lines left out are on this page only. The plate keeps what it had.
        </p>
      </LeaveUnsaved>
    </div>
  );
}

/** The first rows, which column is what, and what that rests on. */
function Columns({ state }: { readonly state: NewScanState }) {
  const { understood, roles, isFromMemory, table } = state;
  if (understood === null) return null;
  const notes = table?.notes ?? understood.notes;
  return (
    <>
      <FilePreview
        understood={understood}
        roles={roles}
        isKnownLight={state.values.lightKind === 'known'}
        onRoles={state.chooseRoles}
      />
      <p className="mt-2">
        {isFromMemory ? (
          <>
            The columns are as in this lab’s last file that looked alike.{' '}
            <TextButton onClick={state.forget}>Take what the file itself says</TextButton>
          </>
        ) : (
          understood.proposal.reason
        )}
      </p>
      {notes.length > 0 && (
        <ul className="text-s text-ink-2 mt-1 space-y-0.5">
          {notes.map((note) => (
            <li key={note}>{note}</li>
          ))}
        </ul>
      )}
    </>
  );
}

function Surroundings({ state }: { readonly state: NewScanState }) {
  const { values, change, faultOf } = state;
  const field = (name: ScanField) => ({
    value: values[name],
    onChange: ({ target }: { readonly target: { readonly value: string } }) =>
      change({ [name]: target.value }),
    fault: faultOf(name),
  });
  return (
    <div className="grid gap-4 sm:grid-cols-2">
      <NumberField label="wavelength, nm" {...field('wavelengthNm')} required />
      <TextField label="measured at (your time)" type="datetime-local" {...field('measuredAt')} required />
      <NumberField
        label="temperature of the plate, °C"
        help="Empty where nobody wrote it down."
        {...field('temperatureC')}
      />
      <TextArea label="note" rows={2} className="sm:col-span-2" maxLength={500} {...field('note')} />
    </div>
  );
}
