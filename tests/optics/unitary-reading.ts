import { DEFAULT_CONVENTION, parseState, parseUnitary, type UnitaryReading } from '../../shared/optics';

type Read = Extract<UnitaryReading, { ok: true }>;

export function read(source: string, convention = DEFAULT_CONVENTION): Read {
  const reading = parseUnitary(source, convention);
  if (!reading.ok) throw new Error(`${source}: column ${reading.error.column}: ${reading.error.message}`);
  return reading;
}

export function stokes(source: string, convention = DEFAULT_CONVENTION): readonly [number, number, number] {
  const reading = parseState(source, convention);
  if (!reading.ok) throw new Error(`${source}: column ${reading.error.column}: ${reading.error.message}`);
  return reading.stokes;
}
