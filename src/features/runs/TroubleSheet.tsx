import { useState } from 'react';
import { Button } from '../../components/Button';
import { TextField } from '../../components/TextField';
import { BenchSheet } from './BenchSheet';

interface TroubleSheetProps {
  /** Counted from 1; null when all settings are passed and there is none to skip. */
  readonly settingNumber: number | null;
  readonly onSkip: (reason: string) => void;
  readonly onPause: (note: string) => void;
  /** Why a pause has to wait. */
  readonly pauseWaitsFor?: string | undefined;
  readonly onClose: () => void;
}

/** What is in the way, and what to do about it: skip the setting with the reason, or pause the run with a note. */
export function TroubleSheet({ settingNumber, onSkip, onPause, pauseWaitsFor, onClose }: TroubleSheetProps) {
  const [text, setText] = useState('');
  const [fault, setFault] = useState('');
  const reason = text.trim();
  const skip = (): void => {
    if (reason === '') setFault('A skipped setting needs its reason. Write what is in the way.');
    else if (reason.length > 200) setFault('The reason is longer than 200 characters. Shorten it.');
    else onSkip(reason);
  };
  const pause = (): void => {
    if (reason.length > 200) setFault('The note is longer than 200 characters. Shorten it.');
    else onPause(reason);
  };
  return (
    <BenchSheet
      title={settingNumber === null ? 'Trouble with this run' : `Trouble at setting ${settingNumber}`}
      onClose={onClose}
    >
      <TextField
        label="what is in the way"
        className="bench-far-field"
        value={text}
        fault={fault}
        maxLength={240}
        onChange={(event) => {
          setText(event.currentTarget.value);
          setFault('');
        }}
      />
      <div className="bench-sheet-actions">
        <Button size="far" onClick={onClose}>
          No trouble
        </Button>
        <Button size="far" onClick={pause} waitsFor={pauseWaitsFor}>
          Pause the run
        </Button>
        {settingNumber !== null && (
          <Button size="far" kind="filled" onClick={skip}>
            Skip setting {settingNumber}
          </Button>
        )}
      </div>
    </BenchSheet>
  );
}
