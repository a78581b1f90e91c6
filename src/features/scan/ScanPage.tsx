import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate, useParams, useSearchParams } from 'react-router-dom';
import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import { TextLink } from '../../components/TextLink';
import { QueryState } from '../../lib/QueryState';
import { kindNames, plateQuery } from '../cabinet';
import { useLab } from '../labs';
import { NewScan } from './NewScan';
import { RecordedScan } from './RecordedScan';

/** Calibration by scan. `?light=known` begins behind known light; `?calibration=` shows a recorded one. */
export function Component() {
  const { lab, may } = useLab();
  const { plateId = '' } = useParams();
  const [search] = useSearchParams();
  const navigate = useNavigate();
  const [now] = useState(() => new Date());
  const detail = useQuery(plateQuery(lab.id, plateId));
  const calibrationId = search.get('calibration');
  const page = `/labs/${lab.id}/cabinet/${plateId}`;
  const plate = detail.data?.plate;
  return (
    <>
      <title>{`Scan of ${plate?.name ?? 'a plate'} · Quarterturn`}</title>
      <div className="mb-6 flex flex-wrap items-baseline gap-x-4 gap-y-1 pt-2">
        <h1 className="text-title">Scan of {plate?.name ?? 'a plate'}</h1>
        {plate !== undefined && <span className="text-ink-2">{seatWords(plate)}</span>}
        <span className="ml-auto">
          <TextLink to={page}>Back to {plate?.name ?? 'the plate'}</TextLink>
        </span>
      </div>
      {detail.data === undefined || plate === undefined ? (
        <QueryState query={detail} what="the plate" />
      ) : calibrationId !== null ? (
        <RecordedScan plate={plate} calibrationId={calibrationId} />
      ) : !may('calibrations.record') ? (
        <p>
          Calibrations are recorded by operators, designers and leads.{' '}
          <TextLink to={page}>See {plate.name}</TextLink>
        </p>
      ) : plate.retiredAt !== null ? (
        <p>
          {plate.name} is retired. A designer or a lead returns it to the cabinet before it is calibrated.{' '}
          <TextLink to={page}>See {plate.name}</TextLink>
        </p>
      ) : plate.seat === null ? (
        <p>
          {plate.name} sits in no mount, so a zero would hold for nothing.{' '}
          <TextLink to={`${page}?do=seat`}>Seat {plate.name}</TextLink>
        </p>
      ) : (
        <NewScan
          key={plate.id}
          plate={{ ...plate, seat: plate.seat }}
          detail={detail.data}
          lightKind={search.get('light') === 'known' ? 'known' : 'linear'}
          now={now}
          onRecorded={() => void navigate(page)}
        />
      )}
    </>
  );
}

function seatWords({ kind, seat }: CabinetPlate): string {
  if (seat === null) return kindNames[kind];
  const way = seat.mount.direction === 1 ? 'counter-clockwise' : 'clockwise';
  return `${kindNames[kind]} in mount ${seat.mount.name}; its numbers rise when it is turned ${way}`;
}
