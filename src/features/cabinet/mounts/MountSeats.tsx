import type { Seat } from '../../../../shared/schemas/mounts';
import { DataCell, DataRow, DataTable, HeadCell, RowHead } from '../../../components/DataTable';
import { TextLink } from '../../../components/TextLink';
import { formatMoment } from '../../../lib/format';

/** Every plate that sat in a mount, newest first. */
export function MountSeats(props: {
  readonly name: string;
  readonly seats: readonly Seat[];
  readonly cabinet: string;
  readonly now: Date;
}) {
  const { name, seats, cabinet, now } = props;
  return (
    <section aria-labelledby="mount-seats">
      <h2 id="mount-seats" className="text-section mb-2">
        What sat in {name}
      </h2>
      {seats.length === 0 ? (
        <p className="text-ink-2">No plate has sat in it yet.</p>
      ) : (
        <DataTable caption={`Plates that sat in ${name}, newest first`}>
          <thead>
            <tr>
              <HeadCell>plate</HeadCell>
              <HeadCell>seated</HeadCell>
              <HeadCell>taken out</HeadCell>
              <HeadCell>why</HeadCell>
            </tr>
          </thead>
          <tbody>
            {seats.map((seat) => (
              <DataRow key={seat.id}>
                <RowHead>
                  <TextLink to={`${cabinet}/${seat.plate.id}`}>{seat.plate.name}</TextLink>
                </RowHead>
                <DataCell>
                  {formatMoment(new Date(seat.seatedAt), now)}
                  <span className="text-s text-ink-2 block">{seat.seatedBy}</span>
                </DataCell>
                <DataCell>
                  {seat.leftAt === null ? 'sits in it now' : formatMoment(new Date(seat.leftAt), now)}
                </DataCell>
                <DataCell>{seat.leftWhy ?? '—'}</DataCell>
              </DataRow>
            ))}
          </tbody>
        </DataTable>
      )}
    </section>
  );
}
