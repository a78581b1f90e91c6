import type { CabinetFileFormat, ImportRequest, ImportResult } from '../../../shared/cabinet-document';
import { request } from '../../lib/api';

/** Where the cabinet is fetched from as a file. */
export function exportAddress(labId: string, format: CabinetFileFormat): string {
  return `/api/v1/labs/${labId}/cabinet/export?format=${format}`;
}

/** A dry run, where there is no plan yet; else the import of the plan that was shown. */
export function sendImport(
  labId: string,
  file: Pick<ImportRequest, 'fileText' | 'format'>,
  planHash: string | null,
): Promise<ImportResult> {
  const body: ImportRequest = { ...file, dryRun: planHash === null, planHash };
  return request<ImportResult>(`/labs/${labId}/cabinet/import`, { method: 'POST', body });
}
