import { useQuery } from '@tanstack/react-query';
import { useMemo } from 'react';
import { type DescribedPlate, recordedScan } from '../../../shared/scan-calibration';
import type { ScanRequest } from './answer-scan';
import { calibrationQuery, scanBytesQuery } from './queries';

/** One recorded scan with its file; null ids ask for nothing. */
export function useStoredScan(
  labId: string,
  plateId: string,
  plate: DescribedPlate,
  calibrationId: string | null,
) {
  const detail = useQuery({
    ...calibrationQuery(labId, plateId, calibrationId ?? ''),
    enabled: calibrationId !== null,
  });
  const fileId = detail.data?.scan?.file.id ?? null;
  const bytes = useQuery({ ...scanBytesQuery(labId, fileId ?? ''), enabled: fileId !== null });
  const { kind, designWavelengthNm, construction, material, order } = plate;
  // A query's result is a new object at every stroke; its data is not.
  const { data } = detail;
  const stored = useMemo(() => {
    if (data === undefined || data.scan === null || bytes.data === undefined) return null;
    const described = { kind, designWavelengthNm, construction, material, order };
    return recordedScan(data.calibration, data.scan.record, bytes.data, described);
  }, [data, bytes.data, kind, designWavelengthNm, construction, material, order]);
  return { detail, bytes, stored };
}

/** A recorded scan to be fitted again from its file, together with the one it was taken together with. */
export function useRecordedScan(
  labId: string,
  plateId: string,
  plate: DescribedPlate,
  calibrationId: string,
) {
  const own = useStoredScan(labId, plateId, plate, calibrationId);
  const light = own.detail.data?.scan?.record.light;
  const beforeId = light?.kind === 'known' ? light.beforeId : null;
  const before = useStoredScan(labId, plateId, plate, beforeId);
  const request = useMemo((): ScanRequest | null => {
    if (own.stored === null || (beforeId !== null && before.stored === null)) return null;
    const { bytes, columns, ...fit } = own.stored;
    return { bytes, columns, isKnownLight: fit.light.kind === 'known', fit, earlier: before.stored };
  }, [own.stored, before.stored, beforeId]);
  const queries = [own.detail, own.bytes, before.detail, before.bytes];
  return { detail: own.detail, request, failed: queries.find(({ isError }) => isError) ?? null };
}
