import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useId, useState } from 'react';
import type { CabinetPlate } from '../../../../shared/schemas/cabinet';
import type { Calibration, CalibrationInput } from '../../../../shared/schemas/calibrations';
import { Button } from '../../../components/Button';
import { Dialog } from '../../../components/Dialog';
import { sayDone } from '../../../components/live-region-store';
import { RingDial } from '../../../components/RingDial';
import { TextArea } from '../../../components/TextArea';
import { TextField } from '../../../components/TextField';
import { formatUncertain } from '../../../lib/format';
import { FormProblem, useIdempotencyKey } from '../../../lib/forms';
import { recordCalibration } from '../queries';
import { settledCalibration, type SettledQuestion, twoReadings } from './settle';

type Reading = 'kept' | 'swapped';

const questionOf = {
  axis: (name: string) => `Which axis of ${name} is the fast one?`,
  branch: (name: string) => `Which of the two is ${name}’s retardance?`,
} as const;

const hints = {
  axis: 'For instance: the mark on its rim is the fast axis. Or: its maker’s sheet.',
  branch: 'For instance: its maker’s sheet. Or: measured at two wavelengths.',
} as const;

/** Shows both readings of what a calibration left open; a person says which one it is and how that is known. */
export function SettleDialog(props: {
  readonly labId: string;
  readonly plate: CabinetPlate;
  readonly calibration: Calibration;
  readonly question: SettledQuestion;
  readonly onClose: () => void;
}) {
  const { labId, plate, calibration, question, onClose } = props;
  const queryClient = useQueryClient();
  const keyFor = useIdempotencyKey();
  const [reading, setReading] = useState<Reading | null>(null);
  const [method, setMethod] = useState('');
  const [note, setNote] = useState('');
  const [pressed, setPressed] = useState(false);
  const settling = useMutation({
    mutationFn: (body: CalibrationInput) => recordCalibration(labId, plate.id, body, keyFor(body)),
    onSuccess: () => {
      onClose();
      sayDone(`Settled: ${plate.name} has a new calibration.`);
      void queryClient.invalidateQueries({ queryKey: ['labs', labId] });
    },
  });
  const press = () => {
    setPressed(true);
    if (reading === null || method.trim() === '') return;
    settling.mutate(settledCalibration(calibration, { question, reading, method, note }));
  };
  if (settling.isSuccess) return null;
  return (
    <Dialog
      open
      onClose={onClose}
      question={questionOf[question](plate.name)}
      actions={
        <>
          <Button kind="filled" onClick={press} waitsFor={settling.isPending ? 'the server' : undefined}>
            Settle it
          </Button>
          <Button onClick={onClose}>Leave it open</Button>
        </>
      }
    >
      <Readings
        {...{ plate, calibration, question, reading }}
        onChoose={setReading}
        fault={pressed && reading === null ? 'Choose one of the two.' : undefined}
      />
      <TextField
        label="how it is known"
        help={hints[question]}
        value={method}
        maxLength={80}
        required
        onChange={(event) => setMethod(event.target.value)}
        fault={pressed && method.trim() === '' ? 'Write how it is known.' : undefined}
      />
      <TextArea
        label="note"
        rows={2}
        maxLength={500}
        value={note}
        onChange={(event) => setNote(event.target.value)}
      />
      <p className="text-s text-ink-2">
        It is recorded as another calibration of the same measurement, which keeps its age. It cannot be
        changed afterwards; a correction is another one.
      </p>
      <FormProblem error={settling.error} />
    </Dialog>
  );
}

function Readings(props: {
  readonly plate: CabinetPlate;
  readonly calibration: Calibration;
  readonly question: SettledQuestion;
  readonly reading: Reading | null;
  readonly onChoose: (reading: Reading) => void;
  readonly fault: string | undefined;
}) {
  const { plate, calibration, question, reading, onChoose, fault } = props;
  const name = useId();
  const { keptDeg, swappedDeg } = twoReadings(calibration, question);
  const sigmaDeg = question === 'axis' ? calibration.offsetSigmaDeg : calibration.retardanceSigmaDeg;
  const choices = [
    { value: 'kept', degrees: keptDeg, words: 'as it is recorded' },
    {
      value: 'swapped',
      degrees: swappedDeg,
      words: question === 'axis' ? 'a quarter turn on' : '360° less it',
    },
  ] as const;
  const legend = question === 'axis' ? 'the dial’s reading with the fast axis along H' : 'the retardance';
  return (
    <fieldset aria-describedby={fault === undefined ? undefined : `${name}-fault`}>
      <legend className="text-s text-ink-2 mb-1">{legend}</legend>
      <div className="flex flex-wrap gap-4">
        {choices.map(({ value, degrees, words }) => (
          <label
            key={value}
            className="border-rule hover:bg-wash has-checked:border-ink has-checked:bg-glass has-focus-visible:outline-beam flex flex-1 cursor-pointer items-center gap-2 border p-3 has-focus-visible:outline-3 has-focus-visible:outline-offset-2"
          >
            <input
              type="radio"
              name={name}
              value={value}
              checked={reading === value}
              onChange={() => onChoose(value)}
              className="accent-ink size-5 shrink-0 outline-none"
            />
            {question === 'axis' && plate.seat !== null && (
              <RingDial
                radius={26}
                kind={plate.kind}
                scale={{ offsetDeg: degrees, direction: plate.seat.mount.direction }}
                readingDeg={keptDeg}
                numbersEveryDeg={null}
                className="shrink-0"
              />
            )}
            <span>
              <span className="font-strong block font-mono whitespace-nowrap">
                {formatUncertain(degrees, sigmaDeg)}°
              </span>
              <span className="text-s text-ink-2">{words}</span>
            </span>
          </label>
        ))}
      </div>
      {fault !== undefined && (
        <p id={`${name}-fault`} role="alert" className="text-s text-fault font-strong mt-1">
          {fault}
        </p>
      )}
    </fieldset>
  );
}
