import { useNavigate } from 'react-router-dom';
import { BeamEmpty } from '../../components/BeamState';
import { TextLink } from '../../components/TextLink';
import { useCommands } from '../../lib/commands';
import { QueryState } from '../../lib/QueryState';
import { useLab } from '../labs';
import { PlateSheet } from './PlateSheet';
import { PlateTray } from './PlateTray';
import type { Tray } from './use-tray';

/** The tray of plates and the open one's sheet below it. Left and Right walk the tray. */
export function TrayAndSheet({
  tray,
  base,
  now,
}: {
  readonly tray: Tray;
  readonly base: string;
  readonly now: Date;
}) {
  const { lab, may } = useLab();
  const navigate = useNavigate();
  const { plates, open, pages, one, unknown } = tray;
  const more = () => {
    if (!pages.isFetchingNextPage) void pages.fetchNextPage();
  };
  const walk = (step: 1 | -1) => {
    if (plates === undefined || open === undefined) return;
    const next = plates[plates.findIndex(({ id }) => id === open.id) + step];
    if (next !== undefined) void navigate(`${base}/${next.id}`, { preventScrollReset: true });
    else if (step === 1 && pages.hasNextPage) more();
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
  if (unknown) {
    return (
      <p>
        There is no such plate here. <TextLink to={base}>See the cabinet</TextLink>
      </p>
    );
  }
  if (plates === undefined) return <QueryState query={pages} what="the cabinet" />;
  if (plates.length === 0) {
    return (
      <BeamEmpty title="No plates in use">
        {may('cabinet.write') ? (
          <>
            Add the first with what is known of it. <TextLink to={`${base}?do=add`}>Add a plate</TextLink>
          </>
        ) : (
          'A designer or the lead adds them.'
        )}{' '}
        <TextLink to={`${base}?view=table&health=retired`}>See retired ones</TextLink>
      </BeamEmpty>
    );
  }
  return (
    <>
      <PlateTray
        {...{ plates, base, now }}
        openId={open?.id}
        dueDays={lab.calibrationDueDays}
        hasMore={pages.hasNextPage}
        onMore={more}
      />
      {open === undefined ? (
        <QueryState query={one} what="the plate" />
      ) : (
        <PlateSheet key={open.id} plate={open} now={now} />
      )}
    </>
  );
}
