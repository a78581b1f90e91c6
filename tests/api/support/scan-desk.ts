import { DEFAULT_CONVENTION } from '../../../shared/optics';
import type { LinearScanFit } from '../../../shared/optics/calibration';
import { parseState } from '../../../shared/optics/expression';
import { fitScan, type ScanLight } from '../../../shared/scan-calibration';
import {
  type CabinetPlate,
  cabinetPlateSchema,
  type Calibration,
  calibrationDetailSchema,
  calibrationSchema,
  fileSchema,
  plateDetailSchema,
  problemSchema,
  type RecordScan,
  type ScanColumns,
} from '../../../shared/schemas';
import { answered, call, upload } from './calls';
import { type Agent, type Harness } from './harness';
import { quarterBody } from './lab';

export const TRUTH = { offsetDeg: 31.73, retardanceDeg: 86.9, direction: -1, leak: 2e-4 } as const;
export const LINEAR = { kind: 'linear', extinction: null, power: null } as const;
export const BOTH: ScanColumns = {
  dial: { column: 0, unit: 'deg' },
  crossed: { column: 1, unit: 'mW' },
  parallel: { column: 2, unit: 'mW' },
  crossedSigma: null,
  parallelSigma: null,
};
export const ONE: ScanColumns = { ...BOTH, parallel: null };

interface Shown {
  readonly columns?: ScanColumns;
  readonly light?: RecordScan['light'];
  readonly before?: LinearScanFit | null;
  readonly leftOut?: RecordScan['leftOut'];
}

function lightOf({ light = LINEAR, before = null }: Shown): ScanLight {
  if (light.kind === 'linear') return light;
  const read = parseState(light.inputExpression, DEFAULT_CONVENTION);
  if (!read.ok) throw new Error(read.error.message);
  const { analyserDeg, extinction } = light;
  return { kind: 'known', input: read.stokes, analyserDeg, extinction, before };
}

/** What the page would have fitted from the same bytes. */
export function fitOf(plate: CabinetPlate, text: string, shown: Shown = {}) {
  const answer = fitScan({
    bytes: new TextEncoder().encode(text),
    columns: shown.columns ?? BOTH,
    light: lightOf(shown),
    leftOutLines: (shown.leftOut ?? []).map(({ line }) => line),
    plate,
    direction: plate.seat?.mount.direction ?? 1,
    wavelengthNm: 810,
    temperatureC: null,
    measuredBefore: null,
  });
  if (answer.kind !== 'fitted') throw new Error(JSON.stringify(answer));
  return answer;
}

export function bodyFor(fileId: string, change: Partial<RecordScan> = {}): RecordScan {
  return {
    fileId,
    columns: BOTH,
    light: LINEAR,
    leftOut: [],
    wavelengthNm: 810,
    temperatureC: null,
    measuredAt: '2026-06-02T08:52:00Z',
    note: '',
    settlesId: null,
    shown: { offsetDeg: 0, retardanceDeg: null },
    ...change,
  };
}

export function problemOf(text: string) {
  const { type, detail, fields = [] } = problemSchema.parse(JSON.parse(text));
  return { code: type.split(':').at(-1), detail, paths: fields.map(({ path }) => path) };
}

/** Plates, files and scans of one lab, as its lead sends them. */
export class ScanDesk {
  #plates = 0;

  constructor(
    readonly harness: Harness,
    readonly lead: Agent,
    readonly labId: string,
  ) {}

  at(path: string): string {
    return `/labs/${this.labId}${path}`;
  }

  addPlate(): Promise<CabinetPlate> {
    this.#plates += 1;
    const body = quarterBody(`Q-${this.#plates}`);
    return answered(call(this.harness, this.lead, 'post', this.at('/plates'), { body }), cabinetPlateSchema);
  }

  store(content: string | Buffer, name = 'scan.csv') {
    return answered(upload(this.harness, this.lead, this.at('/files'), content, name), fileSchema);
  }

  /** The body with which the page would record what it shows. */
  async scanBody(plate: CabinetPlate, text: string, shown: Shown = {}): Promise<RecordScan> {
    const { values } = fitOf(plate, text, shown);
    const { id } = await this.store(text);
    const { columns = BOTH, light = LINEAR, leftOut = [] } = shown;
    return bodyFor(id, {
      columns,
      light,
      leftOut,
      shown: { offsetDeg: values.offsetDeg, retardanceDeg: values.retardance?.deg ?? null },
    });
  }

  send(plate: { readonly id: string }, body: unknown) {
    return call(this.harness, this.lead, 'post', this.at(`/plates/${plate.id}/scans`), { body });
  }

  record(plate: CabinetPlate, body: RecordScan): Promise<Calibration> {
    return answered(this.send(plate, body), calibrationSchema);
  }

  plateNow(plate: { readonly id: string }) {
    return answered(call(this.harness, this.lead, 'get', this.at(`/plates/${plate.id}`)), plateDetailSchema);
  }

  detailOf(plate: CabinetPlate, calibrationId: string) {
    const path = this.at(`/plates/${plate.id}/calibrations/${calibrationId}`);
    return answered(call(this.harness, this.lead, 'get', path), calibrationDetailSchema);
  }
}
