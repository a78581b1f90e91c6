import { TextField } from '../../components/TextField';

interface RecordStageProps {
  readonly note: string;
  readonly onNote: (note: string) => void;
  readonly onRecord: () => void;
}

/** Every dial of the setting says what it should: a note, if there is one to make, before it is recorded. */
export function RecordStage({ note, onNote, onRecord }: RecordStageProps) {
  return (
    <form
      className="bench-record"
      onSubmit={(event) => {
        event.preventDefault();
        onRecord();
      }}
    >
      <TextField
        label="note on this setting, if there is one to make"
        className="bench-far-field"
        maxLength={500}
        value={note}
        onChange={(event) => onNote(event.currentTarget.value)}
      />
    </form>
  );
}
