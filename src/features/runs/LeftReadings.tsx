import { useEffect, useState } from 'react';
import { TextButton } from '../../components/TextLink';
import { useLab } from '../labs';
import { benchKeeping } from './kept-entry';

/**
 * What this device still keeps of a run that is finished: readings that never reached the server are shown until the
 * person drops them; anything else is forgotten at once.
 */
export function LeftReadings({ runId }: { readonly runId: string }) {
  const { user } = useLab();
  const [waiting, setWaiting] = useState(() => benchKeeping(user.id, runId).entry().waiting);
  const forget = (): void => {
    benchKeeping(user.id, runId).forget();
    setWaiting([]);
  };
  useEffect(() => {
    if (waiting.length === 0) benchKeeping(user.id, runId).forget();
  }, [waiting, user.id, runId]);
  if (waiting.length === 0) return null;
  return (
    <section aria-label="Readings that are not in the record" className="hatched mt-4 px-4 py-3">
      <p className="bg-paper px-2 py-1 font-strong">
        {waiting.length === 1 ? 'One reading' : `${waiting.length} readings`} of yours did not reach the
        server before the run was finished. The record does not hold {waiting.length === 1 ? 'it' : 'them'};
        this device does.
      </p>
      <ul className="bg-paper list-none px-2 py-1">
        {waiting.map(({ key, body }) => (
          <li key={key}>
            Setting {body.settingIndex + 1}:{' '}
            {body.outcome === 'done' ? (
              <span className="font-mono">{body.dialledDeg.join(', ')}</span>
            ) : (
              'skipped'
            )}
            {body.note !== '' && `, “${body.note}”`}
          </li>
        ))}
      </ul>
      <p className="bg-paper px-2 py-1">
        <TextButton onClick={forget}>Drop {waiting.length === 1 ? 'it' : 'them'} from this device</TextButton>
      </p>
    </section>
  );
}
