import type { Bench } from '../../../shared/schemas/benches';

/** A bench as a list offers it: "signal arm: H-3, Q-B", or which of its plates it waits for. */
export function benchLabel({ name, plates, notReady }: Pick<Bench, 'name' | 'plates' | 'notReady'>): string {
  const waits = notReady.flatMap((plate) => (plate.part === 'preparation' ? [plate.name] : []));
  return waits.length === 0
    ? `${name}: ${plates.map((plate) => plate.name).join(', ')}`
    : `${name}: waits for ${waits.join(', ')}`;
}
