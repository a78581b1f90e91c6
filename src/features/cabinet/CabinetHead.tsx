import { useQuery } from '@tanstack/react-query';
import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import { TextLink } from '../../components/TextLink';
import { formatLongDate } from '../../lib/format';
import { useLab } from '../labs';
import { countWords } from './count-words';
import { countsQuery } from './queries';

/** The cabinet's name, the day, what lies in it in words, and the ways on. */
export function CabinetHead(props: {
  readonly now: Date;
  readonly shows: 'tray' | 'table' | 'form';
  readonly open: CabinetPlate | undefined;
}) {
  const { now, shows, open } = props;
  const { lab, may } = useLab();
  const counts = useQuery(countsQuery(lab.id));
  const base = `/labs/${lab.id}/cabinet`;
  const edits = may('cabinet.write');
  return (
    <header className="mb-5 flex flex-wrap items-baseline gap-x-5 gap-y-2 pt-2">
      <h1 className="text-title">Cabinet</h1>
      <p className="text-ink-2">
        {formatLongDate(now)}
        {counts.data === undefined ? '.' : `. ${countWords(counts.data)}`}
      </p>
      <nav aria-label="Cabinet" className="flex flex-wrap gap-x-5 gap-y-2 xl:ml-auto">
        {edits && shows !== 'form' && <TextLink to={`${base}?do=add`}>Add a plate</TextLink>}
        {edits && open?.retiredAt === null && (
          <TextLink to={`${base}/${open.id}?do=take-out`} preventScrollReset>
            {open.seat === null ? `Seat ${open.name}` : `Take ${open.name} out or seat it anew`}
          </TextLink>
        )}
        <TextLink to={`${base}/mounts`}>Mounts</TextLink>
        <TextLink to={`${base}/exchange`}>Import or export</TextLink>
        {shows === 'tray' ? (
          <TextLink to={`${base}?view=table`}>As a table</TextLink>
        ) : (
          <TextLink to={base}>As a tray</TextLink>
        )}
      </nav>
    </header>
  );
}
