import { useState } from 'react';
import { useNavigate, useParams, useSearchParams } from 'react-router-dom';
import { useLab } from '../labs';
import { CabinetHead } from './CabinetHead';
import { NewPlateForm } from './NewPlateForm';
import { RefusedTask } from './RefusedTask';
import { PlateTable } from './table/PlateTable';
import { TrayAndSheet } from './TrayAndSheet';
import { useTray } from './use-tray';
import { whoMay } from './who-may';

/** The lab's plates in a tray, the open one's sheet below. `?do=add` opens the form of a new one, `?view=table` the table. */
export function Component() {
  const { lab, may } = useLab();
  const { plateId } = useParams();
  const [search] = useSearchParams();
  const navigate = useNavigate();
  const [now] = useState(() => new Date());
  const adds = plateId === undefined && search.get('do') === 'add' && may('cabinet.write');
  const shows = adds ? 'form' : plateId === undefined && search.get('view') === 'table' ? 'table' : 'tray';
  const tray = useTray(lab.id, plateId, shows === 'tray');
  const base = `/labs/${lab.id}/cabinet`;
  return (
    <>
      <title>{`${tray.open?.name ?? 'Cabinet'} · Quarterturn`}</title>
      <CabinetHead now={now} shows={shows} open={tray.open} />
      <RefusedTask refusal={whoMay(search.get('do'), may)} />
      {shows === 'form' && (
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
      )}
      {shows === 'table' && <PlateTable base={base} now={now} />}
      {shows === 'tray' && <TrayAndSheet tray={tray} base={base} now={now} />}
    </>
  );
}
