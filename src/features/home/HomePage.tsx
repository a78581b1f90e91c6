import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { formatLongDate } from '../../lib/format';
import { QueryState } from '../../lib/QueryState';
import { useLab } from '../labs';
import { CabinetByAge } from './CabinetByAge';
import { waitingTitle } from './count-words';
import { LastMadeAxis } from './LastMade';
import { homeQuery } from './queries';
import { WaitingList } from './WaitingList';

/** What waits for this person, what the benches last made, and how old the calibrations are. */
export function Component() {
  const { lab } = useLab();
  const [now] = useState(() => new Date());
  const home = useQuery(homeQuery(lab.id));
  const { data } = home;
  const waits = data !== undefined && data.waiting.length > 0;
  return (
    <>
      <title>{`${data === undefined ? 'Home' : waitingTitle(data.waiting.length)} · Quarterturn`}</title>
      <div className="grid grid-cols-1 gap-x-14 gap-y-8 pt-2 lg:grid-cols-[minmax(0,1.86fr)_minmax(0,1fr)]">
        <div>
          <header className="mb-4 flex flex-wrap items-baseline gap-x-5">
            <h1 className="text-title">{data === undefined ? 'Home' : waitingTitle(data.waiting.length)}</h1>
            <p className="text-ink-2">
              {formatLongDate(now)}
              <span className="sm:hidden">, {lab.name}</span>
            </p>
          </header>
          <div className="border-ink border-t-[1.5px]">
            {data === undefined ? (
              <QueryState query={home} what="what waits for you" />
            ) : waits ? (
              <WaitingList items={data.waiting} cabinet={data.cabinet} now={now} />
            ) : (
              <p className="text-ink-2 py-4">Runs, drafts and calibrations that need you will stand here.</p>
            )}
          </div>
        </div>
        {data !== undefined && data.lastMade.length > 0 && (
          <section aria-labelledby="last-made">
            <h2 id="last-made" className="mb-5 text-[1.375rem] leading-7 font-title">
              What the benches last made
            </h2>
            <div className="border-ink border-t-[1.5px] pt-2">
              <LastMadeAxis items={data.lastMade} />
            </div>
          </section>
        )}
      </div>
      {data !== undefined && data.cabinet.length > 0 && <CabinetByAge plates={data.cabinet} now={now} />}
    </>
  );
}
