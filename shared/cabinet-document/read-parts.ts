import type { z } from 'zod';
import {
  type CabinetDocument,
  cabinetFormat,
  documentCalibrationSchema,
  documentMountSchema,
  documentPlateHeadSchema,
  documentSeatHeadSchema,
  type DocumentCalibration,
  type DocumentMount,
  type DocumentPlate,
  type DocumentSeat,
} from './document';
import type { PartPath } from './faults';

/** Takes a fault; @returns whether more are of any use. */
export type Report = (path: PartPath, message: string) => boolean;

/**
 * Reads mounts and plates part by part, so that a file of nonsense ends at its hundredth fault instead of being read whole.
 * @returns null where something was reported.
 */
export function readParts(
  raw: { readonly mounts: unknown; readonly plates: unknown },
  report: Report,
): CabinetDocument | null {
  const reader = new PartReader(report);
  const mounts = reader.list(raw.mounts, ['mounts'], reader.mount);
  const plates = reader.list(raw.plates, ['plates'], reader.plate);
  return reader.isWhole ? { format: cabinetFormat, mounts, plates } : null;
}

export function isRecord(value: unknown): value is Readonly<Record<string, unknown>> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

class PartReader {
  isWhole = true;
  private goesOn = true;

  constructor(private readonly report: Report) {}

  readonly mount = (raw: unknown, path: PartPath): DocumentMount | null =>
    this.take(documentMountSchema, raw, path);

  readonly plate = (raw: unknown, path: PartPath): DocumentPlate | null => {
    const { seats, ...head } = isRecord(raw) ? raw : {};
    const read = this.take(documentPlateHeadSchema, isRecord(raw) ? head : raw, path);
    if (!isRecord(raw)) return null;
    const list = this.list(seats, [...path, 'seats'], this.seat);
    return read === null ? null : { ...read, seats: list };
  };

  private readonly seat = (raw: unknown, path: PartPath): DocumentSeat | null => {
    const { calibrations, ...head } = isRecord(raw) ? raw : {};
    const read = this.take(documentSeatHeadSchema, isRecord(raw) ? head : raw, path);
    if (!isRecord(raw)) return null;
    const list = this.list(calibrations, [...path, 'calibrations'], this.calibration);
    return read === null ? null : { ...read, calibrations: list };
  };

  private readonly calibration = (raw: unknown, path: PartPath): DocumentCalibration | null =>
    this.take(documentCalibrationSchema, raw, path);

  list<Part>(raw: unknown, path: PartPath, read: (part: unknown, path: PartPath) => Part | null): Part[] {
    if (!Array.isArray(raw)) {
      this.fault(path, 'This is a list; write [] where it is empty.');
      return [];
    }
    const parts: Part[] = [];
    for (const [index, part] of raw.entries()) {
      if (!this.goesOn) break;
      const done = read(part, [...path, index]);
      if (done !== null) parts.push(done);
    }
    return parts;
  }

  private take<S extends z.ZodType>(schema: S, raw: unknown, path: PartPath): z.output<S> | null {
    const parsed = schema.safeParse(raw);
    if (parsed.success) return parsed.data;
    for (const issue of parsed.error.issues) {
      const at = [...path, ...issue.path.filter((key) => typeof key !== 'symbol')];
      this.fault(
        issue.code === 'unrecognized_keys' ? [...at, ...issue.keys.slice(0, 1)] : at,
        wordsOf(issue),
      );
    }
    return null;
  }

  private fault(path: PartPath, message: string): void {
    this.isWhole = false;
    if (this.goesOn) this.goesOn = this.report(path, message);
  }
}

/** What an issue says, where the schema itself has no sentence for it. */
function wordsOf(issue: z.core.$ZodIssue): string {
  if (issue.code === 'unrecognized_keys') return 'There is no such field. Leave it out.';
  if (issue.code === 'invalid_value') return oneOf(issue.values);
  if (issue.code === 'invalid_union') {
    return oneOf(
      issue.errors.flat().flatMap((inner) => (inner.code === 'invalid_value' ? inner.values : [])),
    );
  }
  if (issue.code === 'invalid_type' && issue.expected === 'object') {
    return 'This is an object with the fields that an export writes.';
  }
  return issue.message;
}

const oneOf = (values: readonly unknown[]): string => `Write one of these: ${values.map(String).join(', ')}.`;
