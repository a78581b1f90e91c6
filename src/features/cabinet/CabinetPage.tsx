import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate, useParams, useSearchParams } from 'react-router-dom';
import { BeamEmpty, BeamWrong } from '../../components/BeamState';
import { TextLink } from '../../components/TextLink';
import { useCommands } from '../../lib/commands';
import { formatLongDate } from '../../lib/format';
import { QueryState } from '../../lib/QueryState';
import { useLab } from '../labs';
import { NewPlateForm } from './NewPlateForm';
import { PlateSheet } from './PlateSheet';
import { PlateTable } from './PlateTable';
import { PlateTray } from './PlateTray';
import { platesQuery } from './queries';
import { whoMay } from './who-may';

/** "12 plates, two of them retired." */
function countWords(all: number, retired: number): string {
  const plates = all === 1 ? '1 plate' : `${all} plates`;
  return retired === 0 ? plates : `${plates}, ${retired} of them retired`;
}

/** The lab's plates in a tray, the open one's sheet below. `?do=add` opens the form of a new one, `?view=table` the table. */
export function Component() {
  const { lab, may } = useLab();
  const { plateId } = useParams();
  const [search] = useSearchParams();
  const navigate = useNavigate();
  const [now] = useState(() => new Date());
  const plates = useQuery(platesQuery(lab.id));
  const items = plates.data?.items ?? [];
  const tray = items.filter(({ id, retiredAt }) => retiredAt === null || id === plateId);
  const adds = search.get('do') === 'add' && may('cabinet.write');
  const refusal = whoMay(search.get('do'), may);
  const asTable = search.get('view') === 'table';
  const open = adds || asTable ? undefined : (tray.find(({ id }) => id === plateId) ?? tray[0]);
  const base = `/labs/${lab.id}/cabinet`;
  const walk = (step: 1 | -1) => {
    const index = tray.findIndex(({ id }) => id === open?.id);
    const next = tray[index + step];
    if (index >= 0 && next !== undefined) void navigate(`${base}/${next.id}`, { preventScrollReset: true });
  };
  useCommands([
    {
      id: 'cabinet.next',
      label: 'Open the next plate',
      keys: ['ArrowRight'],
      when: () => open !== undefined,
      run: () => walk(1),
    },
    {
      id: 'cabinet.previous',
      label: 'Open the plate before',
      keys: ['ArrowLeft'],
      when: () => open !== undefined,
      run: () => walk(-1),
    },
  ]);
  const unknown =
    plateId !== undefined && plates.data !== undefined && !items.some(({ id }) => id === plateId);
  return (
    <>
      <title>{`${open?.name ?? 'Cabinet'} · Quarterturn`}</title>
      <header className="mb-5 flex flex-wrap items-baseline gap-x-5 gap-y-2 pt-2">
        <h1 className="text-title">Cabinet</h1>
        <p className="text-ink-2">
          {formatLongDate(now)}
          {plates.data === undefined
            ? '.'
            : `. ${countWords(items.length, items.filter(({ retiredAt }) => retiredAt !== null).length)}.`}
        </p>
        <nav aria-label="Cabinet" className="flex gap-5 sm:ml-auto">
          {may('cabinet.write') && !adds && <TextLink to={`${base}?do=add`}>Add a plate</TextLink>}
          {asTable || adds ? (
            <TextLink to={base}>As a tray</TextLink>
          ) : (
            <TextLink to={`${base}?view=table`}>As a table</TextLink>
          )}
        </nav>
      </header>
      {refusal !== null && (
        <BeamWrong title={refusal} className="mb-6">
          Ask the lab’s lead for that role.
        </BeamWrong>
      )}
      {adds ? (
        <section aria-labelledby="new-plate" className="border-ink border-t-[1.5px] pt-5">
          <h2 id="new-plate" className="text-title mb-5">
            A plate that comes into the cabinet
          </h2>
          <NewPlateForm
            labId={lab.id}
            now={now}
            onCreated={(plate) => void navigate(`${base}/${plate.id}`)}
            onLeave={() => void navigate(base)}
          />
        </section>
      ) : plates.data === undefined ? (
        <QueryState query={plates} what="the cabinet" />
      ) : items.length === 0 ? (
        <BeamEmpty title="No plates yet">
          {may('cabinet.write') ? (
            <>
              Add the first with what was measured of it.{' '}
              <TextLink to={`${base}?do=add`}>Add a plate</TextLink>
            </>
          ) : (
            'A designer or the lead adds them.'
          )}
        </BeamEmpty>
      ) : asTable ? (
        <PlateTable plates={items} base={base} dueDays={lab.calibrationDueDays} now={now} />
      ) : unknown ? (
        <p>
          There is no such plate here. <TextLink to={base}>See the cabinet</TextLink>
        </p>
      ) : (
        <>
          <PlateTray plates={tray} openId={open?.id} base={base} dueDays={lab.calibrationDueDays} now={now} />
          {open === undefined ? (
            <p className="pt-5">
              Every plate is retired. <TextLink to={`${base}?view=table`}>See them in the table</TextLink>
            </p>
          ) : (
            <PlateSheet key={open.id} plate={open} now={now} />
          )}
        </>
      )}
    </>
  );
}
