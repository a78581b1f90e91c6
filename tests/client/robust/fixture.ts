import type { Plate } from '../../../shared/schemas/cabinet';
import * as anyOf from '../../support/plates';

export const id = anyOf.idsFrom('0197c3a0');

export const plate = (number: number, name: string, retardanceDeg: number, change: Partial<Plate> = {}) =>
  anyOf.plate({
    id: id(number),
    name,
    kind: retardanceDeg > 135 ? 'half' : 'quarter',
    mount: { name: `M-${number}`, repeatabilityDeg: 0.02 },
    calibration: { id: id(number + 100), retardanceDeg, retardanceSigmaDeg: 0.2, offsetDeg: 10 },
    ...change,
  });

export const bench = (number: number, name: string, plates: readonly Plate[]) =>
  anyOf.bench({ id: id(number), name, plates: [...plates] });
