import { useState } from 'react';
import type { VersionContent } from '../../../shared/schemas/versions';
import { Button } from '../../components/Button';
import { NumberField } from '../../components/NumberField';
import { BenchSheet } from './BenchSheet';
import type { SettingSteps } from './bench-steps';
import { DialAnswer, readDial } from './DialAnswer';
import { wantedDials } from './dial-cost';
import { dialText } from './move-words';

interface OtherReadingSheetProps {
  readonly content: VersionContent;
  readonly settingIndex: number;
  readonly steps: SettingSteps;
  readonly onKeep: (plateIndex: number, dialDeg: number) => void;
  readonly onClose: () => void;
}

/** What a dial really says, where that isn't what was wanted: the page answers with what it costs, the person decides. */
export function OtherReadingSheet({ content, settingIndex, steps, onKeep, onClose }: OtherReadingSheetProps) {
  const readable = steps.plates.filter(({ state }) => state !== 'waits');
  const [plateIndex, setPlateIndex] = useState(steps.now?.plateIndex ?? readable.at(-1)?.plateIndex ?? 0);
  const [text, setText] = useState('');
  const [fault, setFault] = useState('');
  const plate = content.bench.plates[plateIndex];
  const step = steps.plates[plateIndex];
  if (plate === undefined || step === undefined) return null;
  const read = readDial(text);
  const wanted = wantedDials(content, settingIndex);
  const dialsDeg = steps.plates.map((other, index) =>
    other.state === 'dialled' || other.state === 'stays'
      ? (other.standsDeg ?? wanted[index] ?? 0)
      : (wanted[index] ?? 0),
  );
  const keep = (): void => {
    if (read.ok) onKeep(plateIndex, read.dialDeg);
    else setFault(read.fault);
  };
  return (
    <BenchSheet title={`What does ${plate.name} say?`} onClose={onClose}>
      <form
        className="bench-other"
        onSubmit={(event) => {
          event.preventDefault();
          keep();
        }}
      >
        <div className="bench-other-entry">
          {readable.length > 1 && (
            <fieldset className="bench-choice">
              <legend className="sr-only">Which plate</legend>
              {readable.map(({ plateIndex: index }) => (
                <label key={index} className="bench-choice-cell">
                  <input
                    type="radio"
                    name="plate"
                    checked={index === plateIndex}
                    onChange={() => {
                      setPlateIndex(index);
                      setText('');
                      setFault('');
                    }}
                  />
                  {content.bench.plates[index]?.name}
                </label>
              ))}
            </fieldset>
          )}
          <NumberField
            label={`${plate.name} says, degrees`}
            className="bench-far-field"
            value={text}
            fault={fault}
            placeholder={dialText(step.wantedDeg, plate.mount.resolutionDeg)}
            onChange={(event) => {
              setText(event.currentTarget.value);
              setFault('');
            }}
          />
        </div>
        <div role="status" className={read.ok ? 'bench-answer hatched' : 'bench-answer-empty'}>
          {read.ok && (
            <DialAnswer
              {...{ content, settingIndex, plateIndex, dialsDeg }}
              typedDeg={read.dialDeg}
              fromDeg={step.state === 'now' ? step.standsDeg : null}
            />
          )}
        </div>
        <div className="bench-sheet-actions">
          <Button size="far" onClick={onClose}>
            Turn once more
          </Button>
          <Button size="far" kind="filled" type="submit">
            {read.ok ? `Keep ${dialText(read.dialDeg, plate.mount.resolutionDeg)}` : 'Keep what it says'}
          </Button>
        </div>
      </form>
    </BenchSheet>
  );
}
