import { keepPreviousData, useQuery } from '@tanstack/react-query';
import { useId, useState } from 'react';
import type { CabinetMount } from '../../../../shared/schemas/mounts';
import { TextField } from '../../../components/TextField';
import { QueryState } from '../../../lib/QueryState';
import { usePaused } from '../../../lib/use-paused';
import { dialWords, driveNames } from './mount-words';
import { mountPageQuery } from './queries';

/** More would not be read: who sees none that fits writes more of its name. */
const shownMounts = 6;

/** One of the cabinet's empty mounts, found by its name or note. */
export function EmptyMountChoice(props: {
  readonly labId: string;
  readonly chosenId: string;
  readonly onChoose: (mount: CabinetMount) => void;
  readonly fault?: string | undefined;
}) {
  const { labId, chosenId, onChoose, fault } = props;
  const name = useId();
  const [text, setText] = useState('');
  const search = usePaused(text.trim());
  const found = useQuery({
    ...mountPageQuery(labId, { state: 'empty', search, limit: shownMounts }),
    placeholderData: keepPreviousData,
  });
  const mounts = found.data?.items;
  return (
    <div className="space-y-3">
      <TextField
        label="find an empty mount by its name or note"
        type="search"
        autoComplete="off"
        value={text}
        onChange={(event) => setText(event.target.value)}
      />
      {mounts === undefined ? (
        <QueryState query={found} what="the empty mounts" />
      ) : (
        <fieldset aria-describedby={fault === undefined ? undefined : `${name}-fault`}>
          <legend className="sr-only">empty mounts</legend>
          {mounts.map((mount) => (
            <label
              key={mount.id}
              className="border-hair hover:bg-wash flex min-h-11 items-center gap-3 border-b"
            >
              <input
                type="radio"
                name={name}
                value={mount.id}
                checked={mount.id === chosenId}
                onChange={() => onChoose(mount)}
                className="accent-ink size-5 shrink-0"
              />
              <span>
                <span className="font-strong">{mount.name}</span>{' '}
                <span className="text-s text-ink-2">
                  {driveNames[mount.drive]}, {dialWords(mount)}
                </span>
              </span>
            </label>
          ))}
          <p role="status" className="text-s text-ink-2 mt-1">
            {mounts.length === 0 &&
              (search === ''
                ? 'No mount is empty. Take a plate out of one, or add a new mount.'
                : 'No empty mount is found by that.')}
            {found.data?.nextCursor !== null && 'There are more: write part of a name.'}
          </p>
          {fault !== undefined && (
            <p id={`${name}-fault`} role="alert" className="text-s text-fault font-strong">
              {fault}
            </p>
          )}
        </fieldset>
      )}
    </div>
  );
}
