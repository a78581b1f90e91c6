import { keepPreviousData, useQuery } from '@tanstack/react-query';
import { type KeyboardEvent, useId, useState } from 'react';
import { type CabinetPlate, type PlateKind, plateKindSchema } from '../../../shared/schemas/cabinet';
import { classNames } from '../../components/class-names';
import { controlBox, Field } from '../../components/Field';
import { SelectField } from '../../components/SelectField';
import { platePageQuery } from '../cabinet';
import { usePaused } from '../../lib/use-paused';
import { useLab } from '../labs';
import { PlateSummary } from './PlateSummary';
import { plateHealthWords, plateWhere } from './plate-state-words';

/** More would not be read: who sees none that fits writes more of its name. */
const shownPlates = 8;

const kindOptions = [
  { value: '', label: 'any kind' },
  { value: 'half', label: 'half-wave' },
  { value: 'quarter', label: 'quarter-wave' },
  { value: 'other', label: 'other' },
] as const;

/** A plate of the cabinet, found by its name, serial, mount or note: a text field whose suggestions take the arrow keys. */
export function PlateFinder(props: {
  readonly label: string;
  readonly benchId: string | null;
  /** Plates that stand in this beam already. */
  readonly inBeam: readonly string[];
  readonly now: Date;
  readonly onChoose: (plate: CabinetPlate) => void;
}) {
  const { label, benchId, inBeam, now, onChoose } = props;
  const { lab } = useLab();
  const listId = useId();
  const [text, setText] = useState('');
  const [kind, setKind] = useState<PlateKind | null>(null);
  const [open, setOpen] = useState(false);
  const [active, setActive] = useState<number | null>(null);
  const search = usePaused(text.trim());
  const found = useQuery({
    ...platePageQuery(lab.id, { search, limit: shownPlates, ...(kind === null ? {} : { kind }) }),
    enabled: open,
    // What was found before stands until the next is there.
    placeholderData: keepPreviousData,
  });
  const plates = open ? (found.data?.items ?? []) : [];
  const activePlate = active === null ? undefined : plates[active];
  const optionId = (plate: CabinetPlate) => `${listId}-${plate.id}`;

  const close = () => {
    setOpen(false);
    setActive(null);
  };
  const choose = (plate: CabinetPlate) => {
    setText('');
    close();
    onChoose(plate);
  };
  const step = (by: 1 | -1) => {
    setOpen(true);
    if (plates.length === 0) return;
    const from = active ?? (by === 1 ? -1 : 0);
    setActive((from + by + plates.length) % plates.length);
  };
  const press = (event: KeyboardEvent<HTMLInputElement>) => {
    if (event.key === 'ArrowDown' || event.key === 'ArrowUp') {
      event.preventDefault();
      step(event.key === 'ArrowDown' ? 1 : -1);
    } else if (event.key === 'Enter' && open) {
      // Never the form's own button while a list is open.
      event.preventDefault();
      if (activePlate !== undefined) choose(activePlate);
    } else if (event.key === 'Escape' && open) {
      event.preventDefault();
      close();
    }
  };
  return (
    <div
      className="bench-finder"
      onBlur={({ currentTarget, relatedTarget }) => {
        if (!currentTarget.contains(relatedTarget)) close();
      }}
    >
      <Field label={label} className="min-w-0 grow basis-64">
        {(control) => (
          <input
            {...control}
            type="text"
            role="combobox"
            aria-expanded={open}
            aria-controls={listId}
            aria-autocomplete="list"
            aria-activedescendant={activePlate === undefined ? undefined : optionId(activePlate)}
            autoComplete="off"
            spellCheck={false}
            placeholder="name, serial, mount or note"
            maxLength={60}
            className={controlBox}
            value={text}
            onChange={(event) => {
              setText(event.target.value);
              setOpen(true);
              setActive(null);
            }}
            onClick={() => setOpen(true)}
            onKeyDown={press}
          />
        )}
      </Field>
      <SelectField
        label="kind"
        className="w-36"
        options={kindOptions}
        value={kind ?? ''}
        onChange={({ target }) => {
          setKind(plateKindSchema.safeParse(target.value).data ?? null);
          setActive(null);
        }}
      />
      <ul
        id={listId}
        role="listbox"
        aria-label={`Plates of the cabinet, ${label}`}
        className={classNames('bench-suggestions', plates.length === 0 && 'hidden')}
      >
        {plates.map((plate, index) => (
          <li
            key={plate.id}
            id={optionId(plate)}
            role="option"
            aria-selected={index === active}
            className="bench-suggestion"
            // The field keeps the focus: the list is its own, not a place to go to.
            onPointerDown={(event) => event.preventDefault()}
            onClick={() => choose(plate)}
          >
            <Suggestion plate={plate} where={plateWhere(plate, { benchId, inBeam })} now={now} />
          </li>
        ))}
      </ul>
      <p role="status" className="text-s text-ink-2 basis-full">
        {open && foundWords(found, { search, more: (found.data?.nextCursor ?? null) !== null })}
      </p>
    </div>
  );
}

function Suggestion(props: { readonly plate: CabinetPlate; readonly where: string; readonly now: Date }) {
  const { plate, where, now } = props;
  const { lab } = useLab();
  const { calibrationDueDays } = lab;
  return (
    <>
      <strong>{plate.name}</strong>{' '}
      <span className="text-ink-2">
        <PlateSummary plate={plate} />
      </span>
      <span className="text-s text-ink-2 block">
        {plateHealthWords(plate, { calibrationDueDays, now })}
        {where !== '' && (
          <>
            ; <b className="text-ink">{where}</b>
          </>
        )}
      </span>
    </>
  );
}

function foundWords(
  found: {
    readonly data: { readonly items: readonly unknown[] } | undefined;
    readonly isError: boolean;
    readonly isFetching: boolean;
    readonly isPlaceholderData: boolean;
  },
  { search, more }: { readonly search: string; readonly more: boolean },
): string {
  if (found.isError) return 'The cabinet could not be asked. Write on to ask again.';
  if (found.data === undefined || found.isPlaceholderData) return 'The cabinet is being asked.';
  const count = found.data.items.length;
  if (count === 0) {
    return search === ''
      ? 'The cabinet holds no such plate.'
      : `No plate in use has “${search}” in its name, serial, mount or note.`;
  }
  if (more) return `The first ${count}; write more of the name to see others.`;
  return count === 1 ? 'One plate.' : `${count} plates.`;
}
